/**
 * A designation reduced to what tells sizes apart: capitals, no blanks or hyphens, one multiplication sign, no idle zeros.
 * `CHS 139,7 × 6.30`, `chs139.7x6.3` and `CHS139.7X6.3` are the same.
 */
export function normalDesignation(text: string): string {
  return text
    .toUpperCase()
    .replace(/[×*]/g, 'X')
    .replace(/[\s-]+/g, '')
    .replace(/(\d),(\d)/g, '$1.$2')
    .replace(/\d+\.\d+/g, (number) => String(Number(number)))
}

/** The `count` candidates nearest to what was asked: same letters first, then by the ratio of their sizes. */
export function nearestDesignations(asked: string, candidates: readonly string[], count = 3): string[] {
  const wanted = parts(asked)
  return candidates
    .map((candidate, order) => ({ candidate, order, distance: distance(wanted, parts(candidate)) }))
    .filter(({ distance }) => distance < FAR)
    .sort((a, b) => a.distance - b.distance || a.order - b.order)
    .slice(0, count)
    .map(({ candidate }) => candidate)
}

/** Above this nothing resembles what was asked; empirical. */
const FAR = 14

/** Letters weigh more than any ratio of sizes between neighbours of one series; empirical. */
const OTHER_LETTERS = 10

interface Parts {
  readonly letters: string
  readonly numbers: readonly number[]
}

function parts(designation: string): Parts {
  const normal = normalDesignation(designation)
  return {
    letters: normal.replace(/[^A-Z]/g, ''),
    numbers: (normal.match(/\d+(\.\d+)?/g) ?? []).map(Number),
  }
}

function distance(a: Parts, b: Parts): number {
  const length = Math.max(a.numbers.length, b.numbers.length)
  let sum = a.letters === b.letters ? 0 : OTHER_LETTERS
  for (let i = 0; i < length; i += 1) {
    const [x, y] = [a.numbers[i] ?? 0, b.numbers[i] ?? 0]
    if (x !== y) sum += x > 0 && y > 0 ? Math.abs(Math.log(x / y)) : 1
  }
  return sum
}
