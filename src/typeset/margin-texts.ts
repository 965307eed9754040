import type { FrontMatter } from '../sheet/types.ts'
import { REVIEW_SHORT, STATUS } from './notices.ts'
import { peopleLine } from './people.ts'
import type { MarginTexts } from './style-text.ts'
import { alarmWords, type Outcome } from './verdict-words.ts'

/** Digits of the digest that the foot of a page carries: enough to tell two prints apart. */
const SHORT = 12

/** What stands in the margins of every printed page; `templates/print.css` says where. */
export function marginTexts(
  meta: FrontMatter,
  { digest, programVersion }: { readonly digest?: string | undefined; readonly programVersion: string },
  outcome: Outcome,
): MarginTexts {
  const revision = meta.revision === undefined ? '' : `\u00a0\u00a0\u00a0revision ${meta.revision}`
  return {
    'head-left': [meta.project, meta.title].filter(Boolean).join('\n'),
    'head-alarm': alarmWords(outcome),
    'head-right': `${meta.sheet}${revision}\n${STATUS}\n`,
    'foot-left': `${peopleLine(meta)}\n${REVIEW_SHORT}`,
    'foot-right': `Stanchion ${programVersion}\n${digest === undefined ? '' : shortDigest(digest)}`,
  }
}

function shortDigest(digest: string): string {
  const [algorithm = '', digits = ''] = digest.split(':')
  return `${algorithm} ${digits.slice(0, SHORT)}`
}
