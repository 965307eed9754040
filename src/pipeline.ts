import { resolve } from 'node:path'
import type { VFileMessage } from 'vfile-message'
import { calculate } from './calculate/calculate.ts'
import type { Calculation } from './calculate/types.ts'
import { finding } from './finding.ts'
import { isProfileProblem, resolveProfile } from './quantity/profile.ts'
import { SheetLibrary } from './sheet/library.ts'
import { parseSheet } from './sheet/parse-sheet.ts'
import { readText } from './sheet/read-text.ts'
import type { Sheet } from './sheet/types.ts'
import { verdictOf, type SheetVerdict } from './verify/verdict.ts'
import { verify } from './verify/verify.ts'

/** A sheet to be calculated: a file, or a text that came another way (standard input). */
export interface SheetSource {
  /** As the user gave it; findings name it. */
  readonly path: string
  readonly text?: string
}

export interface PrepareOptions {
  /** The folder from which paths are taken. */
  readonly cwd?: string
  /** Shared by sheets prepared together, so that a sheet used by many is read once. */
  readonly library?: SheetLibrary
}

/** A sheet as far as it got: read, parsed, calculated, verified. */
export interface Prepared {
  readonly path: string
  readonly calculation?: Calculation
  /** All findings, in the order of file and place. */
  readonly findings: readonly VFileMessage[]
  readonly verdict: SheetVerdict
  /** The texts that findings refer to, by file. */
  readonly texts: ReadonlyMap<string, string>
}

/** Takes one sheet through the stages: read → parse → calculate → verify. Never throws for what a sheet says. */
export function prepareSheet(source: SheetSource, options: PrepareOptions = {}): Prepared {
  const cwd = options.cwd ?? process.cwd()
  const library = options.library ?? new SheetLibrary()
  const texts = new Map<string, string>()

  const read = source.text === undefined ? readText(resolve(cwd, source.path)) : { text: source.text }
  if ('problem' in read)
    return done(source.path, [atStart('file-unreadable', read.problem, read.hint, source.path)], texts)

  const parsed = parseSheet(read.text, source.path)
  texts.set(source.path, parsed.text)
  if (!parsed.sheet) return done(source.path, parsed.findings, texts)

  const calculation = calculate(parsed.sheet, {
    loadSheet(id, from) {
      const found = library.find(id, from.path, cwd)
      if ('rule' in found) return { problem: found }
      const { sheet, findings, text } = found.parsed
      if (sheet && !found.builtIn) texts.set(sheet.path, text)
      if (sheet) return { id: found.id, builtIn: found.builtIn, sheet, findings }
      for (const { file } of findings) if (file) texts.set(file, text)
      return {
        problem: {
          rule: 'bad-reference',
          message: `\`${id}\` cannot be used: it has no usable front matter`,
          hint: 'see its own findings',
        },
        findings,
      }
    },
  })
  const findings = [
    ...parsed.findings,
    ...profileFindings(parsed.sheet),
    ...calculation.findings,
    ...verify(calculation),
  ]
  return done(source.path, findings, texts, calculation)
}

function done(
  path: string,
  findings: readonly VFileMessage[],
  texts: ReadonlyMap<string, string>,
  calculation?: Calculation,
): Prepared {
  const sorted = inOrder(findings, path)
  return {
    path,
    findings: sorted,
    verdict: verdictOf(calculation, sorted),
    texts,
    ...(calculation ? { calculation } : {}),
  }
}

function profileFindings(sheet: Sheet): VFileMessage[] {
  const profile = resolveProfile(sheet.meta.units)
  if (!isProfileProblem(profile)) return []
  const span = sheet.metaPlaces.get('units') ?? START
  return [
    finding({
      rule: 'bad-front-matter',
      message: `\`units\`: ${profile.problem}`,
      hint: profile.suggestion ?? 'write `metric`, `us`, or a map such as `{force: kN, length: mm}`',
      file: sheet.path,
      span,
    }),
  ]
}

const START = { start: { line: 1, column: 1, offset: 0 }, end: { line: 1, column: 1, offset: 0 } }

function atStart(rule: 'file-unreadable', message: string, hint: string, file: string): VFileMessage {
  return finding({ rule, message, hint, file, span: START })
}

/** By file (the sheet's own first), then by place; the same finding once. */
function inOrder(findings: readonly VFileMessage[], path: string): VFileMessage[] {
  const key = ({ file, line, column, ruleId, reason }: VFileMessage) =>
    [file, line, column, ruleId, reason].join('|')
  const unique = [...new Map(findings.map((message) => [key(message), message])).values()]
  const rank = (message: VFileMessage) => (message.file === path ? 0 : 1)
  return unique.sort(
    (a, b) =>
      rank(a) - rank(b) ||
      compareText(a.file ?? '', b.file ?? '') ||
      (a.line ?? 0) - (b.line ?? 0) ||
      (a.column ?? 0) - (b.column ?? 0),
  )
}

function compareText(a: string, b: string): number {
  return a < b ? -1 : a > b ? 1 : 0
}
