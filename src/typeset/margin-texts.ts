import type { FrontMatter } from '../sheet/types.ts'
import { REVIEW_SHORT, STATUS } from './notices.ts'
import { peopleLine } from './people.ts'
import type { MarginTexts } from './style-text.ts'
import { alarmWords, type Outcome } from './verdict-words.ts'

/** Digits of the digest that the foot of a page carries: enough to tell two prints apart. */
const SHORT = 12
/** Characters of the project's name and of the title in the head of a page. */
const HEAD = 80

/** What stands in the margins of every printed page; `templates/print.css` says where. */
export function marginTexts(
  meta: FrontMatter,
  { digest, programVersion }: { readonly digest?: string | undefined; readonly programVersion: string },
  outcome: Outcome,
): MarginTexts {
  const revision = meta.revision === undefined ? '' : `\u00a0\u00a0\u00a0revision ${meta.revision}`
  return {
    'head-left': [meta.project, meta.title].flatMap((text) => (text ? shortened(text) : [])).join('\n'),
    'head-alarm': alarmWords(outcome),
    'head-right': `${meta.sheet}${revision}\n${STATUS}\n`,
    'foot-left': `${peopleLine(meta)}\n${REVIEW_SHORT}`,
    'foot-right': `Stanchion ${programVersion}\n${digest === undefined ? '' : shortDigest(digest)}`,
  }
}

/** As much as there is room for in the head of a page; the first sheet has the whole. */
function shortened(text: string): string {
  const characters = [...text]
  return characters.length <= HEAD
    ? text
    : `${characters
        .slice(0, HEAD - 1)
        .join('')
        .trimEnd()}…`
}

function shortDigest(digest: string): string {
  const [algorithm = '', digits = ''] = digest.split(':')
  return `${algorithm} ${digits.slice(0, SHORT)}`
}
