const GREEK_NAMES =
  'alpha beta gamma delta zeta eta theta iota kappa lambda mu nu xi pi rho sigma tau upsilon chi psi omega'.split(
    ' ',
  )

const ESCAPES: ReadonlyMap<string, string> = new Map([
  ['\\', '\\textbackslash{}'],
  ...['{', '}', '$', '%', '#', '&', '_'].map((character) => [character, `\\${character}`] as const),
  ['^', '\\textasciicircum{}'],
  ['~', '\\textasciitilde{}'],
  // Two of these beside each other would be joined to a dash or a quotation mark.
  ...['-', "'", '`'].map((character) => [character, `${character}{}`] as const),
  ...[...'⁰¹²³⁴⁵⁶⁷⁸⁹'].map((character, i) => [character, `$^{${String(i)}}$`] as const),
  ['µ', '$\\mu$'],
  ['…', '$\\ldots$'],
  ['≠', '$\\neq$'],
  ...[...'αβγδζηθικλμνξπρστυχψω'].map((letter, i) => [letter, `$\\${GREEK_NAMES[i] ?? ''}$`] as const),
  ['ε', '$\\varepsilon$'],
  ['φ', '$\\varphi$'],
])

/** What KaTeX's fonts, or its fall-back to the reader's, can set as text; measured over the whole plane by a test. */
const PRINTABLE =
  /^[ -~£¥§¨©¬®°±¶·¸À-ɏΓΔΘΛΞΠΣΦΨΩЀ-ӿ\u0530-\u058f\u0900-\u10ff–—‘’“”†‡′←-↓−≤≥\u3001-\u30ff\u4e00-\u9faf\uac00-\ud7af]$/u

/**
 * Any text as the content of `\text{…}`: every character stands for itself, and nothing in it can act on the formula. A
 * character that cannot be set is named by its code, `[U+1F600]`, rather than lost.
 */
export function escapeText(text: string): string {
  let tex = ''
  for (const character of text.replaceAll(/\s+/g, ' ')) {
    if (character === ' ') tex += '\\ '
    else tex += ESCAPES.get(character) ?? (PRINTABLE.test(character) ? character : codeOf(character))
  }
  return tex
}

function codeOf(character: string): string {
  const code = character.codePointAt(0) ?? 0
  return `[U+${code.toString(16).toUpperCase().padStart(4, '0')}]`
}

/** A text, upright, as it is. */
export function textTex(text: string): string {
  return text === '' ? '' : `\\text{${escapeText(text)}}`
}

/** A text value, in quotation marks. */
export function quotedTex(text: string): string {
  return `\\text{“${escapeText(text)}”}`
}
