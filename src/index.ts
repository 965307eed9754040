/** The library: sheets as text in, calculations and documents out. */
export type { Calculation, CheckLine, NamedLine, Quantity, SolverReport, Value } from './calculate/types.ts'
export type { SheetVerdict } from './verify/verdict.ts'
export { prepareSheet, type PrepareOptions, type Prepared, type SheetSource } from './pipeline.ts'
export { calculationJson } from './record/calculation-json.ts'
export { digestOf } from './record/digest.ts'
export { stableJson } from './record/stable-json.ts'
export { valuesText } from './record/values-text.ts'
export { programVersion } from './version.ts'
