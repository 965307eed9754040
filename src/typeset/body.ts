import type { Element, ElementContent } from 'hast'
import { h } from 'hastscript'
import type { Heading } from 'mdast'
import type { CalculatedBlock, CalculatedInline } from '../calculate/types.ts'
import { blockContent } from './block-content.ts'
import { pictureProblem, proseMathProblem } from './prose-problems.ts'
import { proseMath } from './mathematics.ts'
import { proseToHast, type OwnNode } from './prose.ts'
import type { Scope } from './scope.ts'
import { valueText } from './value-text.ts'

/**
 * A sheet in its author's order: the prose with values and mathematics put in, and each block as a checker reads it.
 *
 * @param ranks how much lower its headings stand than in the text
 * @param prefix of the ids of its headings, for a sheet used by another
 */
export function sheetBody(scope: Scope, ranks: number, prefix = ''): ElementContent[] {
  const { calculation } = scope
  const blocks = new Map<unknown, CalculatedBlock>(
    calculation.blocks.map((block) => [block.block.node, block]),
  )
  const values = new Map(calculation.inlineValues.map((value) => [value.inline.span.start.offset, value]))
  let depth = 0
  const fill = (node: OwnNode): ElementContent[] | undefined => {
    switch (node.type) {
      case 'heading':
        depth = node.depth
        return sectionNumber(node, scope)
      case 'code': {
        const block = blocks.get(node)
        return block && blockContent(block, scope, Math.max(depth, 1) + ranks + 1)
      }
      case 'sheetValue':
        return inlineValue(values.get(node.position?.start.offset ?? -1), node.value, scope)
      default:
        return writtenMath(node, scope)
    }
  }
  const document = { ranks, prefix, insteadOf: (picture: Element) => insteadOf(picture, scope) }
  return proseToHast(calculation.sheet.tree, { fill, document }).children as ElementContent[]
}

function sectionNumber(node: Heading, { page, outer }: Scope): ElementContent[] | undefined {
  const section = outer ? undefined : page.numbers.begun.get(node)
  return section && [h('span', { className: 'section-number' }, `${String(section.number)} `)]
}

function inlineValue(found: CalculatedInline | undefined, text: string, scope: Scope): ElementContent[] {
  if (!found?.value) {
    return [h('span', { className: 'not-calculated' }, [h('code', text), ' not calculated'])]
  }
  const { value, operand, unit, formula } = found
  const how = { ...operand, ...(unit ? { unit } : {}) }
  const origin = operand?.origin ?? 'derived'
  const from = origin === 'carried' && formula?.type === 'name' ? lender(formula.path, scope) : undefined
  // What a method gives is calculated on this page.
  const shown = valueText(value, origin === 'carried' && !from ? 'derived' : origin, scope.page, how)
  return from === undefined ? [shown] : [shown, h('span', { className: 'lender' }, `\u00a0${from}`)]
}

/** The id of the sheet that lends a value; nothing for a method, which is worked on this page. */
function lender([first = '']: readonly string[], { calculation }: Scope): string | undefined {
  const used = calculation.usedSheets.get(first)
  return used && !used.builtIn ? used.calculation.sheet.meta.sheet : undefined
}

function writtenMath(
  node: Extract<OwnNode, { type: 'math' | 'inlineMath' }>,
  scope: Scope,
): ElementContent[] {
  const display = node.type === 'math'
  const set = proseMath(node.value, display, scope.page)
  if ('ok' in set) return display ? [h('div', { className: 'display-math' }, set.ok)] : set.ok
  scope.page.problems.push(proseMathProblem(node, set, scope.calculation.sheet))
  const mark = h('span', { className: 'not-calculated' }, [
    h('code', node.value),
    ' cannot be set as mathematics',
  ])
  return [display ? h('p', [mark]) : mark]
}

/** The page loads nothing: only pictures that are in the text itself are on it. */
function insteadOf(picture: Element, scope: Scope): Element | undefined {
  const src = typeof picture.properties.src === 'string' ? picture.properties.src : ''
  if (/^data:image\/(png|jpeg|gif|webp|svg\+xml)[;,]/.test(src)) return undefined
  scope.page.problems.push(pictureProblem(picture, src, scope.calculation.sheet))
  const words = `picture ${src === '' ? 'without address' : src} is not on the page`
  return h('span', { className: 'not-calculated' }, words)
}
