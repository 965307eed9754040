import { spawn } from 'node:child_process'
import { chmodSync, mkdirSync, mkdtempSync, readFileSync, readdirSync, readlinkSync } from 'node:fs'
import { rmSync, statSync, symlinkSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import { PublishProblem } from '../../src/publish/publish-problem.ts'
import { FILES, writeAtomic, type WriteOptions } from '../../src/publish/write-atomic.ts'

let folder: string
beforeEach(() => {
  folder = mkdtempSync(join(tmpdir(), 'stanchion-write-'))
})
afterEach(() => rmSync(folder, { recursive: true, force: true }))

const inFolder = (name: string) => join(folder, name)

function problemOf(path: string, options?: WriteOptions): PublishProblem {
  try {
    writeAtomic(path, 'new', options)
  } catch (error) {
    expect(error).toBeInstanceOf(PublishProblem)
    return error as PublishProblem
  }
  throw new Error('the file was written')
}

/** The file operations, one of which fails as the system would make it fail. */
function failing(operation: keyof typeof FILES, code: string): typeof FILES {
  const fail = () => {
    throw Object.assign(new Error(`${code}: ${operation}`), { code })
  }
  return { ...FILES, [operation]: fail }
}

describe('writing a file whole or not at all', () => {
  it('writes text and bytes', () => {
    writeAtomic(inFolder('a.html'), 'λ̄ = 0.93')
    writeAtomic(inFolder('a.pdf'), Uint8Array.of(37, 80, 68, 70))
    expect(readFileSync(inFolder('a.html'), 'utf8')).toBe('λ̄ = 0.93')
    expect([...readFileSync(inFolder('a.pdf'))]).toEqual([37, 80, 68, 70])
    expect(readdirSync(folder).sort()).toEqual(['a.html', 'a.pdf'])
  })

  it('replaces a file, keeping its mode', () => {
    writeFileSync(inFolder('a.html'), 'old')
    chmodSync(inFolder('a.html'), 0o646)
    writeAtomic(inFolder('a.html'), 'new')
    expect(readFileSync(inFolder('a.html'), 'utf8')).toBe('new')
    expect(statSync(inFolder('a.html')).mode & 0o777).toBe(0o646)
  })

  it('writes through a link and leaves the link', () => {
    writeFileSync(inFolder('real.html'), 'old')
    symlinkSync('real.html', inFolder('link.html'))
    writeAtomic(inFolder('link.html'), 'new')
    expect(readlinkSync(inFolder('link.html'))).toBe('real.html')
    expect(readFileSync(inFolder('real.html'), 'utf8')).toBe('new')
  })

  it('makes the folder when asked to', () => {
    writeAtomic(inFolder('out/sheets/a.html'), 'new', { createFolder: true })
    expect(readFileSync(inFolder('out/sheets/a.html'), 'utf8')).toBe('new')
  })

  it('is not stopped by a temporary file that a killed process left', () => {
    writeFileSync(inFolder(`.a.html.${process.pid}-0.part`), 'left')
    writeAtomic(inFolder('a.html'), 'new')
    expect(readFileSync(inFolder('a.html'), 'utf8')).toBe('new')
  })

  it('accepts a name as long as the disk allows', () => {
    const name = 'x'.repeat(255)
    writeAtomic(inFolder(name), 'new')
    expect(readFileSync(inFolder(name), 'utf8')).toBe('new')
  })
})

describe('a file that cannot be written', () => {
  it('keeps the old content and leaves no temporary file, whatever fails', () => {
    writeFileSync(inFolder('a.html'), 'old')
    for (const operation of ['openSync', 'writeFileSync', 'fsyncSync', 'renameSync'] as const) {
      const problem = problemOf(inFolder('a.html'), { files: failing(operation, 'ENOSPC') })
      expect(problem.message).toBe(`cannot write \`${inFolder('a.html')}\`: no space is left on the disk`)
      expect(problem.hint).toContain('-o DIR')
      expect(readFileSync(inFolder('a.html'), 'utf8')).toBe('old')
      expect(readdirSync(folder)).toEqual(['a.html'])
    }
  })

  it('says that the folder does not exist', () => {
    expect(problemOf(inFolder('none/a.html')).message).toContain(
      `the folder \`${inFolder('none')}\` does not exist`,
    )
  })

  it('says that a folder of that name is there', () => {
    mkdirSync(inFolder('a.html'))
    expect(problemOf(inFolder('a.html')).message).toContain('a folder of that name is there')
  })

  it('says that a part of the path is a file, with and without making folders', () => {
    writeFileSync(inFolder('file'), '')
    expect(problemOf(inFolder('file/a.html')).message).toContain('is a file, not a folder')
    for (const path of ['file/a.html', 'file/deeper/a.html']) {
      const problem = problemOf(inFolder(path), { createFolder: true })
      expect(problem.message).toMatch(/is a file/)
    }
  })

  it('says that a name is too long', () => {
    expect(problemOf(inFolder('x'.repeat(256))).message).toContain('longer than this disk allows')
  })

  it('refuses what is not an ordinary file', () => {
    expect(problemOf('/dev/null').message).toContain('not an ordinary file')
  })

  it('tells a missing permission, a read-only disk and an unforeseen failure apart', () => {
    const message = (code: string) => problemOf(inFolder('a'), { files: failing('openSync', code) }).message
    expect(message('EACCES')).toContain('no permission to write')
    expect(message('EROFS')).toContain('the disk is read-only')
    expect(message('EBUSY')).toContain('open in another program')
    expect(message('EIO')).toContain('the system says: EIO: openSync')
  })

  it('is of one rule, in lower case, without a full stop, with a hint and the original error', () => {
    const problem = problemOf(inFolder('none/a.html'))
    expect(problem.rule).toBe('output-unwritable')
    expect(problem.message).toMatch(/^[a-z].*[^.]$/)
    expect(problem.hint).toMatch(/^[a-z].*[^.]$/)
    expect(problem.cause).toMatchObject({ code: 'ENOENT' })
  })
})

describe('an interrupted process', () => {
  it.skipIf(process.platform === 'win32').each(['SIGINT', 'SIGTERM', 'SIGHUP'] as const)(
    'cleans up on %s and ends by that signal',
    async (signal) => {
      const module = new URL('../../src/publish/clean-up.ts', import.meta.url).pathname
      const script = `
        import { writeFileSync } from 'node:fs'
        import { cleanUpOnExit } from ${JSON.stringify(module)}
        cleanUpOnExit(() => writeFileSync(${JSON.stringify(inFolder('cleaned'))}, 'yes'))
        setInterval(() => {}, 1000)
        console.log('ready')`
      const { transformWithOxc } = await import('vite')
      const { code } = await transformWithOxc(readFileSync(module, 'utf8'), module)
      writeFileSync(inFolder('clean-up.mjs'), code)
      writeFileSync(inFolder('run.mjs'), script.replace(JSON.stringify(module), '"./clean-up.mjs"'))
      const child = spawn(process.execPath, [inFolder('run.mjs')], { stdio: ['ignore', 'pipe', 'inherit'] })
      child.stdout.once('data', () => child.kill(signal))
      const ended = await new Promise((resolve) => child.once('exit', (_, by) => resolve(by)))
      expect(ended).toBe(signal)
      expect(readFileSync(inFolder('cleaned'), 'utf8')).toBe('yes')
    },
  )
})
