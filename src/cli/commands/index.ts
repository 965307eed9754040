import type { Command } from '../command.ts'

const SHEETS = '`-` reads a sheet from standard input'

/** Every command, in the order of the help. */
export const COMMANDS: readonly Command[] = [
  {
    name: 'print',
    args: '<sheet...>',
    summary: 'write each sheet as a self-contained HTML document, and as PDF',
    details: `The document is written beside the sheet, or under the folder that \`-o\` names. A sheet that cannot be calculated is not written. ${SHEETS} and needs \`-o\`.`,
    flags: [
      { flags: '--pdf', summary: 'write the PDF too (needs Chromium, Chrome or Edge)' },
      { flags: '-o, --output <dir>', summary: 'folder to write to; made when it does not exist' },
      { flags: '--paper <size>', summary: 'A4 or Letter, in place of what the sheet says' },
      {
        flags: '--browser <path>',
        summary: 'the browser to print with; otherwise STANCHION_BROWSER, then the usual places',
      },
    ],
    load: () => import('./print.ts'),
  },
  {
    name: 'check',
    args: '<sheet...>',
    summary: 'calculate sheets and report verdicts and findings; write nothing',
    details: `Prints a table of all checks of each sheet, with utilisations, the governing one marked, and the findings. ${SHEETS}.`,
    flags: [
      {
        flags: '--json',
        summary: 'print the calculation as JSON (one object, or an array for several sheets)',
      },
    ],
    load: () => import('./check.ts'),
  },
  {
    name: 'values',
    args: '<sheet...>',
    summary: 'print one stable line a value, for version control’s text conversion',
    details: `After \`git config diff.sheet.textconv "npx stanchion values --textconv ."\` and with \`*.md diff=sheet\` in \`.gitattributes\`, \`git diff\` compares values instead of text. ${SHEETS}.`,
    flags: [
      {
        flags: '--textconv <dir>',
        summary:
          'for version control, which hands over a copy: take the paths in the sheet from this folder, print errors as lines, end with 0',
      },
    ],
    load: () => import('./values.ts'),
  },
  {
    name: 'new',
    args: '[starter]',
    summary: 'start a sheet from a starter',
    details:
      'Starters: `sheet` (the default), `us-sheet`, `mechanism`, `basis`, `method`. Written to standard output, or to the file that `-o` names; an existing file is never written over.',
    flags: [{ flags: '-o, --output <file>', summary: 'file to write' }],
    load: () => import('./new.ts'),
  },
  {
    name: 'methods',
    args: '',
    summary: 'list the built-in methods and functions',
    details: '`stanchion explain ID` says more about any of them.',
    flags: [],
    load: () => import('./methods.ts'),
  },
  {
    name: 'explain',
    args: '<id>',
    summary: 'explain a function, method, finding, unit or kind',
    details:
      'ID is the name of any of them, the path of a sheet made for others, or `functions`, `methods`, `units`, `kinds` or `findings` for a list.',
    flags: [],
    load: () => import('./explain.ts'),
  },
  {
    name: 'schema',
    args: '<name>',
    summary: 'print the JSON Schema of `front-matter` or of `calculation`',
    details:
      'Editors use the first to complete and check front matter; other programs use the second to read `check --json`.',
    flags: [],
    load: () => import('./schema.ts'),
  },
]
