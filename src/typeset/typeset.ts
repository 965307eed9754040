import type { Element, ElementContent, Root } from 'hast'
import { h } from 'hastscript'
import type { VFileMessage } from 'vfile-message'
import type { Calculation } from '../calculate/types.ts'
import { isProfileProblem, resolveProfile, type Profile } from '../quantity/profile.ts'
import type { FrontMatter } from '../sheet/types.ts'
import type { SheetVerdict } from '../verify/verdict.ts'
import { templateText } from './assets.ts'
import { sheetBody } from './body.ts'
import { charactersSeen } from './characters.ts'
import { checksOfPage } from './checks-of-page.ts'
import { checksTable } from './checks-table.ts'
import { computationRecord } from './computation-record.ts'
import { contents } from './contents.ts'
import { findingsList } from './findings-list.ts'
import { numberLines } from './line-numbers.ts'
import { marginTexts } from './margin-texts.ts'
import { notation } from './notation.ts'
import { cautions, reviewNotice, STATUS } from './notices.ts'
import { openPoints } from './open-points.ts'
import { fillTemplate, type Slots } from './page-template.ts'
import { peopleTable } from './people.ts'
import { usePlainTags } from './pdf-tags.ts'
import { references } from './references.ts'
import type { Page, Scope } from './scope.ts'
import { styleText, type Paper } from './style-text.ts'
import { banner, verdictWords, type Outcome } from './verdict-words.ts'

export interface TypesetOptions {
  /** All findings of the sheet; those met in typesetting are added to them on the page. */
  readonly findings: readonly VFileMessage[]
  readonly verdict: SheetVerdict
  readonly digest?: string | undefined
  readonly programVersion: string
  /** For the PDF: mathematics is named in words, since a reader of tagged PDF finds no MathML in it. */
  readonly forPdf?: boolean | undefined
  /** Instead of what the sheet asks for; A4 when it asks for nothing. */
  readonly paper?: Paper | undefined
}

declare module 'hast' {
  interface RootData {
    /** What was met in typesetting a sheet, such as mathematics in prose that cannot be set. */
    findings?: readonly VFileMessage[]
  }
}

/**
 * A calculated sheet as a complete page of HTML that loads nothing: its fonts and style are inside. The same calculation
 * gives the same tree. `data.findings` of the tree holds what could not be printed as its author meant it.
 */
export function typeset(calculation: Calculation, options: TypesetOptions): Root {
  const page: Page = {
    profile: profileOf(calculation),
    numbers: numberLines(calculation),
    forPdf: options.forPdf ?? false,
    problems: [],
    cautioned: new Set(),
    set: new Map(),
  }
  const body = sheetBody({ page, calculation } satisfies Scope, 1)
  const findings = [...options.findings, ...page.problems]
  const checks = checksOfPage(calculation)
  const outcome: Outcome = { verdict: options.verdict, checks, findings }
  const tree = fillTemplate(templateText('page.html'), {
    ...titleBlock(calculation.sheet.meta),
    banner: banner(outcome),
    verdict: [verdictWords(outcome, page)],
    checks: checksTable(checks, page),
    'open-points': openPoints(calculation, checks, page),
    people: [peopleTable(calculation.sheet.meta)],
    review: [reviewNotice()],
    contents: contents(body, page.numbers),
    body,
    notation: notation(calculation, page),
    references: references(calculation, page),
    findings: findingsList(findings, calculation.sheet.path),
    record: computationRecord(calculation, options, page),
    cautions: [cautions()],
  })
  if (page.forPdf) usePlainTags(tree)
  completeHead(tree, calculation.sheet.meta, options, outcome)
  tree.data = { findings: page.problems }
  return tree
}

/** A bad profile has its own finding; the page is then printed in the usual one. */
function profileOf({ sheet }: Calculation): Profile {
  const profile = resolveProfile(sheet.meta.units)
  return isProfileProblem(profile) ? (resolveProfile(undefined) as Profile) : profile
}

function titleBlock(meta: FrontMatter): Slots {
  const text = (value: string | undefined): ElementContent[] =>
    value === undefined ? [] : [{ type: 'text', value }]
  const { source, clause, edition } = meta
  const standard = [source, edition && `edition ${edition}`, clause && `clause ${clause}`]
    .filter(Boolean)
    .join(', ')
  return {
    title: text(meta.title),
    project: text(meta.project),
    subject: text(meta.subject),
    location: text(meta.location),
    contract: text(meta.contract),
    sheet: text(meta.sheet),
    revision: text(meta.revision),
    date: text(meta.date),
    status: text(STATUS),
    source: standard === '' ? [] : [h('p', { className: 'source' }, standard)],
  }
}

/** Nothing may be loaded and nothing may run, whatever the sheet holds. */
const POLICY =
  "default-src 'none'; style-src 'unsafe-inline'; font-src data:; img-src data:; base-uri 'none'; form-action 'none'"

function completeHead(tree: Root, meta: FrontMatter, options: TypesetOptions, outcome: Outcome): void {
  const html = tree.children.find(
    (node): node is Element => node.type === 'element' && node.tagName === 'html',
  )
  const head = html?.children.find(
    (node): node is Element => node.type === 'element' && node.tagName === 'head',
  )
  if (!html || !head) throw new Error('the page template has no <html>')
  html.properties.lang = meta.language ?? 'en'
  const margins = marginTexts(meta, options, outcome)
  const style = styleText(charactersSeen(tree), options.paper ?? meta.paper ?? 'A4', margins)
  head.children.unshift(
    h('meta', { charSet: 'utf-8' }),
    h('meta', { httpEquiv: 'Content-Security-Policy', content: POLICY }),
    h('meta', { name: 'viewport', content: 'width=device-width, initial-scale=1' }),
    h('meta', { name: 'generator', content: `Stanchion ${options.programVersion}` }),
    h('title', `${meta.sheet} ${meta.title}`),
    h('style', style),
  )
}
