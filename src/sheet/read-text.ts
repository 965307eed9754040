import { readFileSync, statSync } from 'node:fs'

export type ReadText = { readonly text: string } | { readonly problem: string; readonly hint: string }

/** Largest file that is read, in bytes. */
const MAX_BYTES = 20_000_000

/** Reads a UTF-8 text file; says why when it cannot. */
export function readText(path: string): ReadText {
  let bytes: Uint8Array
  try {
    const stats = statSync(path)
    // A device may have no end.
    if (stats.isCharacterDevice() || stats.isBlockDevice())
      return {
        problem: 'this is a device, and a sheet was expected',
        hint: 'name the sheet; `-` reads standard input',
      }
    if (stats.size > MAX_BYTES) return tooLarge(stats.size)
    bytes = readFileSync(path)
  } catch (error) {
    return unreadable(error)
  }
  return decodeText(bytes)
}

/** The text that bytes are in UTF-8, or why they are none. */
export function decodeText(bytes: Uint8Array): ReadText {
  if (bytes.length > MAX_BYTES) return tooLarge(bytes.length)
  try {
    return { text: new TextDecoder('utf-8', { fatal: true }).decode(bytes) }
  } catch (error) {
    if (!(error instanceof TypeError)) throw error
    return {
      problem: 'the file is not text in UTF-8',
      hint: 'save it as UTF-8; a sheet is a Markdown text file',
    }
  }
}

function tooLarge(size: number): ReadText {
  return {
    problem: `the file has ${size} bytes, and ${MAX_BYTES} are allowed`,
    hint: 'divide it into several sheets',
  }
}

/** What an error of the file system means for who wanted the text. */
export function unreadable(error: unknown): ReadText {
  const code = (error as NodeJS.ErrnoException).code
  switch (code) {
    case 'ENOENT':
    case 'ENOTDIR':
      return {
        problem: 'there is no such file',
        hint: 'check the path; it is taken from the folder you are in',
      }
    case 'EISDIR':
      return {
        problem: 'this is a folder, and a sheet was expected',
        hint: 'name the sheet, as in `folder/sheet.md`',
      }
    case 'EACCES':
    case 'EPERM':
      return { problem: 'the file may not be read', hint: 'check its permissions' }
    case 'ENAMETOOLONG':
    case 'ELOOP':
    case 'ERR_INVALID_ARG_VALUE':
      return { problem: 'this is not a usable path', hint: 'check the path' }
    default:
      return {
        problem: `the file cannot be read (${code ?? String(error)})`,
        hint: 'check the path and the disk',
      }
  }
}
