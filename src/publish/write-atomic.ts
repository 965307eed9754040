import * as fs from 'node:fs'
import { basename, dirname, join } from 'node:path'
import { cleanUpOnExit } from './clean-up.ts'
import { PublishProblem } from './publish-problem.ts'

/** The file operations used, so that a full disk can be tried in a test. */
export const FILES = {
  closeSync: fs.closeSync,
  fchmodSync: fs.fchmodSync,
  fsyncSync: fs.fsyncSync,
  mkdirSync: fs.mkdirSync,
  openSync: fs.openSync,
  renameSync: fs.renameSync,
  unlinkSync: fs.unlinkSync,
  writeFileSync: fs.writeFileSync,
}

export interface WriteOptions {
  /** Make the folder, and those above it, when it does not exist (for `-o DIR`). */
  readonly createFolder?: boolean
  readonly files?: typeof FILES
}

/**
 * Writes a file whole or not at all: to a temporary file in the same folder, flushed to disk, then renamed over `path`.
 * A reader sees the old content or the new, never a part. An existing file keeps its mode; a link keeps pointing where it did.
 *
 * @throws {PublishProblem} `output-unwritable`, in words, for every failure of the file system; nothing is left behind.
 */
export function writeAtomic(path: string, content: string | Uint8Array, options: WriteOptions = {}): void {
  const files = options.files ?? FILES
  try {
    if (options.createFolder) files.mkdirSync(dirname(path), { recursive: true })
    const { target, mode } = existing(path)
    replaceFile(target, content, mode, files)
  } catch (error) {
    throw error instanceof PublishProblem ? error : unwritable(path, error)
  }
}

/** Where the bytes go: the file itself, or what a link points to; and the mode that an existing file has. */
function existing(path: string): { target: string; mode?: number } {
  const stats = fs.statSync(path, { throwIfNoEntry: false })
  if (!stats) return { target: path }
  if (stats.isDirectory()) throw Object.assign(new Error('is a directory'), { code: 'EISDIR' })
  if (!stats.isFile()) throw Object.assign(new Error('not a regular file'), { code: 'ENOTFILE' })
  return { target: fs.realpathSync(path), mode: stats.mode & 0o777 }
}

function replaceFile(
  target: string,
  content: string | Uint8Array,
  mode: number | undefined,
  files: typeof FILES,
): void {
  const { temporary, descriptor } = openTemporary(target, files)
  const forget = cleanUpOnExit(() => removeQuietly(temporary, files))
  try {
    try {
      if (mode !== undefined) files.fchmodSync(descriptor, mode)
      files.writeFileSync(descriptor, content)
      files.fsyncSync(descriptor)
    } finally {
      files.closeSync(descriptor)
    }
    files.renameSync(temporary, target)
    flushFolder(dirname(target), files)
  } catch (error) {
    removeQuietly(temporary, files)
    throw error
  } finally {
    forget()
  }
}

function openTemporary(target: string, files: typeof FILES): { temporary: string; descriptor: number } {
  for (let n = 0; ; n++) {
    const temporary = join(dirname(target), `.${basename(target).slice(0, 60)}.${process.pid}-${n}.part`)
    try {
      return { temporary, descriptor: files.openSync(temporary, 'wx') }
    } catch (error) {
      // A process of the same number was killed here before and left its file: take the next name.
      if (codeOf(error) !== 'EEXIST' || n > 1000) throw error
    }
  }
}

/** Puts the new name on disk too. Windows cannot open a folder, and flushes names itself. */
function flushFolder(folder: string, files: typeof FILES): void {
  if (process.platform === 'win32') return
  let descriptor: number | undefined
  try {
    descriptor = files.openSync(folder, 'r')
    files.fsyncSync(descriptor)
  } catch (error) {
    // A folder that may not be read, or a network disk that cannot flush one: the file itself is flushed and renamed.
    if (!['EACCES', 'EPERM', 'EINVAL', 'ENOTSUP', 'EBADF'].includes(codeOf(error))) throw error
  } finally {
    if (descriptor !== undefined) files.closeSync(descriptor)
  }
}

function removeQuietly(path: string, files: typeof FILES): void {
  try {
    files.unlinkSync(path)
  } catch (error) {
    if (codeOf(error) !== 'ENOENT') process.emitWarning(`a temporary file is left: ${path}`)
  }
}

const codeOf = (error: unknown): string => (error as NodeJS.ErrnoException | undefined)?.code ?? ''

type Words = (path: string) => readonly [message: string, hint: string]

const ELSEWHERE = 'choose another folder with `-o DIR`'

/** What each failure of the file system means for who wants the file. */
const REASONS: Readonly<Record<string, Words>> = {
  EACCES: (path) => [
    `no permission to write in \`${dirname(path)}\``,
    `change its permissions, or ${ELSEWHERE}`,
  ],
  EPERM: (path) => [
    `writing in \`${dirname(path)}\` is not permitted, or the file is open elsewhere`,
    `close it in other programs, or ${ELSEWHERE}`,
  ],
  EBUSY: () => ['the file is open in another program', 'close it there and print again'],
  EROFS: () => ['the disk is read-only', ELSEWHERE],
  ENOSPC: () => ['no space is left on the disk', `free some space, or ${ELSEWHERE}`],
  EDQUOT: () => ['the disk quota is used up', `free some space, or ${ELSEWHERE}`],
  EFBIG: () => ['the file is larger than is allowed here', ELSEWHERE],
  ENOENT: (path) => [
    `the folder \`${dirname(path)}\` does not exist`,
    'make the folder, or check its spelling',
  ],
  ENOTDIR: (path) => [`a part of \`${dirname(path)}\` is a file, not a folder`, ELSEWHERE],
  EEXIST: (path) => [`\`${dirname(path)}\` is a file, a folder was expected`, ELSEWHERE],
  EISDIR: () => ['a folder of that name is there', `rename the folder, or ${ELSEWHERE}`],
  ENOTFILE: () => ['it is not an ordinary file', 'name an ordinary file'],
  ENAMETOOLONG: () => ['the name is longer than this disk allows', 'give the sheet a shorter file name'],
  ELOOP: () => ['its links lead in a circle', 'remove one of the links'],
}

function unwritable(path: string, error: unknown): PublishProblem {
  const words = REASONS[codeOf(error)]
  const [reason, hint] = words?.(path) ?? [`the system says: ${plain(error)}`, ELSEWHERE]
  return new PublishProblem('output-unwritable', `cannot write \`${path}\`: ${reason}`, hint, error)
}

const plain = (error: unknown): string => (error instanceof Error ? error.message : String(error))
