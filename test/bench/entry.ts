// What the bench measures inside one process, bundled as the command is.
export { calculate } from '../../src/calculate/calculate.ts'
export { prepareSheet } from '../../src/pipeline.ts'
export { htmlText } from '../../src/publish/html-text.ts'
export { printPdf } from '../../src/publish/print-pdf.ts'
export { digestOf } from '../../src/record/digest.ts'
export { parseSheet } from '../../src/sheet/parse-sheet.ts'
export { typeset } from '../../src/typeset/typeset.ts'
export { verify } from '../../src/verify/verify.ts'
