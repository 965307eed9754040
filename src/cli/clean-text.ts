/** Control characters and the marks that turn or hide text, which a sheet could use to write over the terminal. */
const UNSAFE = /[\u0000-\u0008\u000b-\u001f\u007f-\u009f\u061c\u200e\u200f\u2028-\u202e\u2066-\u2069]/g

/** Text that is safe on a terminal: control characters are shown as their code. Line feeds and tabs stay. */
export function cleanText(text: string): string {
  return text.replace(UNSAFE, (character) => {
    const code = character.charCodeAt(0).toString(16)
    return code.length > 2 ? `\\u${code.padStart(4, '0')}` : `\\x${code.padStart(2, '0')}`
  })
}
