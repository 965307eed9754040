import type { Element, ElementContent } from 'hast'
import { s } from 'hastscript'
import type { CheckLine } from '../calculate/types.ts'

/** The bar ends here, in units of the limit; the limit itself is a line at 1. */
const END = 1.25
const WIDTH = 50
const HEIGHT = 6

/** How far a check is used, as a bar up to a line at its limit; full black when the check does not hold. Absent without a utilisation. */
export function utilisationBar({ utilisation, verdict }: CheckLine): ElementContent {
  if (utilisation === undefined) return { type: 'text', value: '' }
  const length = (Math.min(utilisation, END) / END) * WIDTH
  const limit = WIDTH / END
  return s(
    'svg',
    { className: ['bar', verdict], viewBox: `0 0 ${String(WIDTH)} ${String(HEIGHT)}`, ariaHidden: 'true' },
    [
      box(0, WIDTH, 'track'),
      box(0, length, 'used'),
      s('path', { className: 'limit', d: `M${round(limit)} -1V${String(HEIGHT + 1)}` }),
    ],
  )
}

function box(x: number, width: number, className: string): Element {
  return s('rect', { className, x: round(x), y: '0', width: round(width), height: String(HEIGHT) })
}

const round = (value: number): string => String(Math.round(value * 100) / 100)
