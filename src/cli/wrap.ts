const WIDTH = 100

/** Text in lines of at most 100 characters, broken between words. */
export function wrap(text: string, indent = ''): string {
  const lines: string[] = []
  let line = indent
  for (const word of text.split(/\s+/)) {
    if (line.length > indent.length && line.length + 1 + word.length > WIDTH) {
      lines.push(line)
      line = indent
    }
    line += (line.length > indent.length ? ' ' : '') + word
  }
  return [...lines, line].join('\n')
}
