/** The names a text may be a slip for differ from it by at most this share of its letters. */
const FURTHEST = 0.4

/** The one of `names` that takes the fewest letter changes to reach from `text`; undefined when none is near. */
export function nearestName(text: string, names: readonly string[]): string | undefined {
  let best: string | undefined
  let least = Math.floor(text.length * FURTHEST) + 1
  for (const name of names) {
    const changes = editDistance(text.toLowerCase(), name.toLowerCase(), least)
    if (changes < least) [best, least] = [name, changes]
  }
  return best
}

/** Insertions, deletions and replacements that turn `a` into `b` (Levenshtein's distance); `limit` when it is no less. */
function editDistance(a: string, b: string, limit: number): number {
  if (Math.abs(a.length - b.length) >= limit) return limit
  let row = Array.from({ length: b.length + 1 }, (_, j) => j)
  for (let i = 1; i <= a.length; i++) {
    const next = [i]
    for (let j = 1; j <= b.length; j++) {
      const replace = (row[j - 1] ?? 0) + (a[i - 1] === b[j - 1] ? 0 : 1)
      next.push(Math.min(replace, (row[j] ?? 0) + 1, (next[j - 1] ?? 0) + 1))
    }
    row = next
  }
  return Math.min(row[b.length] ?? limit, limit)
}
