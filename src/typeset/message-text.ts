import type { Element } from 'hast'
import { h } from 'hastscript'

/** A message with what stands between its back quotes as code. */
export function messageText(text: string): (Element | string)[] {
  return text.split('`').flatMap((part, i) => (part === '' ? [] : [i % 2 === 1 ? h('code', part) : part]))
}
