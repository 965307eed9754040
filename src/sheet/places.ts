import type { Point, Span } from './types.ts'

/** Finds line and column of any offset in a text with `\n` line endings. */
export class Places {
  private readonly starts: number[] = [0]
  readonly text: string

  constructor(text: string) {
    this.text = text
    for (let i = text.indexOf('\n'); i >= 0; i = text.indexOf('\n', i + 1)) this.starts.push(i + 1)
  }

  point(offset: number): Point {
    let low = 0
    let high = this.starts.length - 1
    while (low < high) {
      const middle = (low + high + 1) >> 1
      if ((this.starts[middle] ?? 0) <= offset) low = middle
      else high = middle - 1
    }
    return { line: low + 1, column: offset - (this.starts[low] ?? 0) + 1, offset }
  }

  span(start: number, end: number): Span {
    return { start: this.point(start), end: this.point(end) }
  }
}
