import type { Code, Construct, Effects, State, TokenizeContext } from 'micromark-util-types'
import type { Extension as FromMarkdown } from 'mdast-util-from-markdown'
import type { Processor } from 'unified'
import type { Position } from 'unist'

declare module 'micromark-util-types' {
  interface TokenTypeMap {
    sheetValue: 'sheetValue'
    sheetValueMarker: 'sheetValueMarker'
    sheetValueExpression: 'sheetValueExpression'
  }
}

/** `:value[expression]` in prose, as it stands in the Markdown tree. */
export interface SheetValueNode {
  type: 'sheetValue'
  /** The expression as written. */
  value: string
  position?: Position
}

declare module 'mdast' {
  interface PhrasingContentMap {
    sheetValue: SheetValueNode
  }
  interface RootContentMap {
    sheetValue: SheetValueNode
  }
}

const MARKER = ':value['
const [LEFT, RIGHT, QUOTE, APOSTROPHE] = ['[', ']', '"', "'"].map((c) => c.charCodeAt(0)) as [
  number,
  number,
  number,
  number,
]

/** A line ending or the end of the text; micromark codes below -2 are line endings. */
const endsLine = (code: Code): boolean => code === null || (code < -2 && code > -6)

/**
 * The text construct for exactly `:value[…]`: the brackets inside are balanced, quoted text is opaque, and it ends on its
 * line. Anything else with a colon is left to Markdown.
 */
const construct: Construct = {
  name: 'sheetValue',
  tokenize(this: TokenizeContext, effects: Effects, ok: State, nok: State): State {
    let matched = 0
    let depth = 0
    let quote: number | undefined
    let empty = true

    const marker: State = (code) => {
      if (code !== MARKER.charCodeAt(matched)) return nok(code)
      effects.consume(code)
      matched++
      if (matched < MARKER.length) return marker
      effects.exit('sheetValueMarker')
      return first
    }
    const first: State = (code) => {
      if (endsLine(code) || code === RIGHT) return nok(code)
      effects.enter('sheetValueExpression')
      return inside(code)
    }
    const inside: State = (code) => {
      if (endsLine(code)) return nok(code)
      if (quote !== undefined) {
        if (code === quote) quote = undefined
      } else if (code === QUOTE || code === APOSTROPHE) quote = code
      else if (code === LEFT) depth++
      else if (code === RIGHT) {
        if (depth === 0) return close(code)
        depth--
      }
      if (code !== 32) empty = false
      effects.consume(code)
      return inside
    }
    const close: State = (code) => {
      if (empty) return nok(code)
      effects.exit('sheetValueExpression')
      effects.enter('sheetValueMarker')
      effects.consume(code)
      effects.exit('sheetValueMarker')
      effects.exit('sheetValue')
      return ok
    }
    return (code) => {
      effects.enter('sheetValue')
      effects.enter('sheetValueMarker')
      return marker(code)
    }
  },
}

const fromMarkdown: FromMarkdown = {
  enter: {
    sheetValue(token) {
      this.enter({ type: 'sheetValue', value: '' }, token)
    },
  },
  exit: {
    sheetValueExpression(token) {
      const node = this.stack.at(-1) as unknown as SheetValueNode
      node.value = this.sliceSerialize(token)
    },
    sheetValue(token) {
      this.exit(token)
    },
  },
}

/** A unified plugin that reads `:value[…]` as a node of its own. */
export function sheetValueSyntax(this: Processor): void {
  const data = this.data() as { micromarkExtensions?: unknown[]; fromMarkdownExtensions?: unknown[] }
  ;(data.micromarkExtensions ??= []).push({ text: { [MARKER.charCodeAt(0)]: construct } })
  ;(data.fromMarkdownExtensions ??= []).push(fromMarkdown)
}
