import { existsSync, readdirSync, realpathSync } from 'node:fs'
import { dirname, isAbsolute, join, posix, relative, resolve, sep } from 'node:path'
import type { FindingInput } from '../finding.ts'
import { packageRoot } from '../package-root.ts'
import { nearestName } from '../quantity/nearest-name.ts'
import { parseSheet, type ParsedSheet } from './parse-sheet.ts'
import { readText } from './read-text.ts'

export type LibraryProblem = Omit<FindingInput, 'file' | 'span'>

export interface FoundSheet {
  readonly id: string
  readonly builtIn: boolean
  readonly parsed: ParsedSheet
}

/** Files that mark the folder of a project; a sheet reaches nothing outside it. */
const PROJECT_MARKS = ['project.yaml', '.git']

const BUILT_IN_ID = /^[a-z0-9][a-z0-9.-]*\/[a-z0-9][a-z0-9.-]*$/

/** Finds and parses the sheets that other sheets use. Each file is read once. */
export class SheetLibrary {
  private readonly parsed = new Map<string, ParsedSheet | LibraryProblem>()

  /**
   * @param id a built-in method's id, or a relative path ending in `.md`
   * @param from path of the using sheet, as given
   * @param cwd folder from which that path is taken
   */
  find(id: string, from: string, cwd: string): FoundSheet | LibraryProblem {
    return id.endsWith('.md') || id.startsWith('.') ? this.byPath(id, from, cwd) : this.builtIn(id)
  }

  private byPath(id: string, from: string, cwd: string): FoundSheet | LibraryProblem {
    const bad = (message: string, hint: string): LibraryProblem => ({ rule: 'bad-reference', message, hint })
    if (isAbsolute(id) || /^[A-Za-z]:/.test(id))
      return bad(
        `\`${id}\` is not a relative path`,
        'name the sheet from this sheet’s folder, as in `./design-basis.md`',
      )
    if (!id.endsWith('.md')) return bad(`\`${id}\` is not a sheet`, 'a sheet’s name ends in `.md`')
    const folder = dirname(resolve(cwd, from))
    const path = resolve(folder, id)
    const root = projectFolder(folder)
    if (!isInside(path, root))
      return bad(
        `\`${id}\` lies outside the project folder`,
        'a sheet uses only files of its own project; copy the sheet there',
      )
    if (existsSync(path) && !isInside(realpathSync(path), realpathSync(root)))
      return bad(
        `\`${id}\` leads outside the project folder through a link`,
        'copy the sheet into the project',
      )
    const shown = shownPath(path, from, cwd)
    const found = this.read(path, shown)
    if ('rule' in found) return { ...found, message: `\`${id}\`: ${found.message}` }
    return { id: posix.normalize(id), builtIn: false, parsed: found }
  }

  private builtIn(id: string): FoundSheet | LibraryProblem {
    const ids = builtInIds()
    const unknown = (hint: string): LibraryProblem => ({
      rule: 'method-unknown',
      message: `there is no method \`${id}\``,
      hint,
    })
    if (!BUILT_IN_ID.test(id))
      return unknown(
        '`stanchion methods` lists the methods; a sheet of your own is named by a path such as `./basis.md`',
      )
    const editions = ids.filter((known) => known === id || withoutEdition(known) === id)
    const exact = editions.find((known) => known === id) ?? (editions.length === 1 ? editions[0] : undefined)
    if (!exact) {
      if (editions.length > 1)
        return {
          rule: 'method-unknown',
          message: `\`${id}\` does not say which edition`,
          hint: `name one of ${editions.map((known) => `\`${known}\``).join(', ')}`,
        }
      const near = nearestName(id, ids)
      return unknown(near ? `did you mean \`${near}\`?` : '`stanchion methods` lists the methods')
    }
    const found = this.read(join(packageRoot(), 'src', 'methods', `${exact}.md`), `${exact}.md`)
    return 'rule' in found ? found : { id: exact, builtIn: true, parsed: found }
  }

  private read(path: string, shown: string): ParsedSheet | LibraryProblem {
    const known = this.parsed.get(path)
    if (known) return known
    const read = readText(path)
    const result: ParsedSheet | LibraryProblem =
      'problem' in read
        ? { rule: 'file-unreadable', message: read.problem, hint: read.hint }
        : parseSheet(read.text, shown)
    this.parsed.set(path, result)
    return result
  }
}

/** `en1993-1-1-2005/6.3.1` is `en1993-1-1/6.3.1`: the edition is the last number of the folder, of two to four digits. */
function withoutEdition(id: string): string {
  return id.replace(/-\d{2,4}(?=\/)/, '')
}

/** The ids of all built-in methods, sorted: `<standard>-<edition>/<clause>`. */
export function builtInIds(): string[] {
  const root = join(packageRoot(), 'src', 'methods')
  return readdirSync(root, { withFileTypes: true })
    .filter((entry) => entry.isDirectory())
    .flatMap((folder) =>
      readdirSync(join(root, folder.name))
        .filter((file) => file.endsWith('.md'))
        .map((file) => `${folder.name}/${file.slice(0, -'.md'.length)}`),
    )
    .sort()
}

/** The nearest folder upwards that is marked as a project, or else the folder itself. */
function projectFolder(folder: string): string {
  for (let at = folder; ; at = dirname(at)) {
    if (PROJECT_MARKS.some((mark) => existsSync(join(at, mark)))) return at
    if (dirname(at) === at) return folder
  }
}

function isInside(path: string, root: string): boolean {
  const way = relative(root, path)
  return way !== '' && !way.startsWith('..') && !isAbsolute(way)
}

/** The used sheet's path in the manner of the using sheet's: relative where that was. */
function shownPath(path: string, from: string, cwd: string): string {
  return isAbsolute(from) ? path : relative(cwd, path).split(sep).join('/')
}
