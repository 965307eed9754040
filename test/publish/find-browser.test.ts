import { chmodSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { describe, expect, it } from 'vitest'
import { findBrowser } from '../../src/publish/find-browser.ts'
import { installCommand } from '../../src/publish/install-command.ts'
import { PublishProblem } from '../../src/publish/publish-problem.ts'
import { thisSystem, type System } from '../../src/publish/system.ts'

const DEBIAN = 'PRETTY_NAME="Debian GNU/Linux 12 (bookworm)"\nID=debian\n'

interface Machine extends Partial<Omit<System, 'isProgram' | 'list'>> {
  readonly programs?: readonly string[]
  readonly folders?: Readonly<Record<string, readonly string[]>>
}

function machine({ programs = [], folders = {}, ...rest }: Machine): System {
  const isProgram = (path: string) => programs.includes(path)
  const list = (folder: string) => folders[folder] ?? []
  const base = { platform: 'linux', env: {}, home: '/home/a', root: false, osRelease: DEBIAN } as const
  return { ...base, ...rest, isProgram, list }
}

function problemOf(system: System, asked?: string): PublishProblem {
  try {
    findBrowser(asked, system)
  } catch (error) {
    expect(error).toBeInstanceOf(PublishProblem)
    return error as PublishProblem
  }
  throw new Error('a browser was found')
}

describe('the browser taken', () => {
  const programs = ['/own', '/ours', '/theirs', '/usr/bin/chromium']
  const ours = { STANCHION_BROWSER: '/ours' }
  const theirs = { PUPPETEER_EXECUTABLE_PATH: '/theirs' }

  it('is the one asked for, then by our variable, then by puppeteer’s, then the usual place', () => {
    expect(findBrowser('/own', machine({ programs, env: { ...ours, ...theirs } }))).toBe('/own')
    expect(findBrowser(undefined, machine({ programs, env: { ...ours, ...theirs } }))).toBe('/ours')
    expect(findBrowser(undefined, machine({ programs, env: theirs }))).toBe('/theirs')
    expect(findBrowser(undefined, machine({ programs }))).toBe('/usr/bin/chromium')
  })

  it('is never another one than the one named', () => {
    const asked = problemOf(machine({ programs }), '/missing')
    expect(asked.message).toBe('the browser `/missing` given by `--browser` is not a program that can be run')
    const named = problemOf(machine({ programs, env: { STANCHION_BROWSER: '/missing' } }))
    expect(named.message).toContain('given by the environment variable STANCHION_BROWSER')
    expect(named.hint).toContain('correct the environment variable STANCHION_BROWSER')
  })

  it('is the newest in puppeteer’s cache, compared by number', () => {
    const chrome = '/home/a/.cache/puppeteer/chrome'
    const folders = {
      [chrome]: ['linux-99.0.1.2', 'linux-140.0.7339.80', 'linux-140.0.7339.185'],
      [`${chrome}/linux-99.0.1.2`]: ['chrome-linux64'],
      [`${chrome}/linux-140.0.7339.80`]: ['chrome-linux64'],
      [`${chrome}/linux-140.0.7339.185`]: ['chrome-linux64'],
    }
    const builds = ['99.0.1.2', '140.0.7339.80', '140.0.7339.185']
    const cached = builds.map((build) => `${chrome}/linux-${build}/chrome-linux64/chrome`)
    expect(findBrowser(undefined, machine({ folders, programs: [...programs, ...cached] }))).toBe(cached[2])
  })

  it('is found in puppeteer’s cache on Windows and macOS too', () => {
    const windows = machine({
      platform: 'win32',
      home: 'C:\\Users\\a',
      folders: {
        'C:\\Users\\a\\.cache\\puppeteer\\chrome': ['win64-140.0.7339.80'],
        'C:\\Users\\a\\.cache\\puppeteer\\chrome\\win64-140.0.7339.80': ['chrome-win64'],
      },
      programs: ['C:\\Users\\a\\.cache\\puppeteer\\chrome\\win64-140.0.7339.80\\chrome-win64\\chrome.exe'],
    })
    expect(findBrowser(undefined, windows)).toMatch(/chrome-win64\\chrome\.exe$/)
    const build = '/cache/chrome/mac_arm-140.0.7339.80'
    const app = 'Google Chrome for Testing.app/Contents/MacOS/Google Chrome for Testing'
    const mac = machine({
      platform: 'darwin',
      env: { PUPPETEER_CACHE_DIR: '/cache' },
      folders: { '/cache/chrome': ['mac_arm-140.0.7339.80'], [build]: ['chrome-mac-arm64'] },
      programs: [`${build}/chrome-mac-arm64/${app}`],
    })
    expect(findBrowser(undefined, mac)).toBe(`${build}/chrome-mac-arm64/${app}`)
  })

  it('is found in the usual places of macOS and Windows', () => {
    const edge = 'C:\\Program Files (x86)\\Microsoft\\Edge\\Application\\msedge.exe'
    const env = { PROGRAMFILES: 'C:\\Program Files', 'PROGRAMFILES(X86)': 'C:\\Program Files (x86)' }
    expect(findBrowser(undefined, machine({ platform: 'win32', env, programs: [edge] }))).toBe(edge)
    const chrome = '/Users/a/Applications/Google Chrome.app/Contents/MacOS/Google Chrome'
    expect(
      findBrowser(undefined, machine({ platform: 'darwin', home: '/Users/a', programs: [chrome] })),
    ).toBe(chrome)
  })

  it('is found on the PATH, but not in the current folder', () => {
    const env = { PATH: '/usr/bin::/opt/tools' }
    const programs = ['chromium', '/opt/tools/google-chrome']
    expect(findBrowser(undefined, machine({ env, programs }))).toBe('/opt/tools/google-chrome')
  })
})

describe('no browser', () => {
  const problem = problemOf(machine({}))

  it('is one problem with the command for this system', () => {
    expect(problem.rule).toBe('browser-missing')
    expect(problem.message).toContain('no browser of the Chromium family was found')
    expect(problem.hint).toContain('run `sudo apt-get install -y chromium`, or')
  })

  it.each([
    ['Debian as root', { root: true }, 'apt-get install -y chromium'],
    ['a kin of Debian', { osRelease: 'ID=raspbian\nID_LIKE=debian\n' }, 'sudo apt-get install -y chromium'],
    ['Ubuntu', { osRelease: 'ID=ubuntu\nID_LIKE=debian\n' }, 'sudo snap install chromium'],
    ['Fedora', { osRelease: 'ID=fedora\n' }, 'sudo dnf install -y chromium'],
    [
      'a kin of RHEL',
      { osRelease: 'ID="rocky"\nID_LIKE="rhel centos fedora"\n' },
      'sudo dnf install -y chromium',
    ],
    ['macOS', { platform: 'darwin' }, 'brew install --cask google-chrome'],
    ['Windows', { platform: 'win32' }, 'winget install --id Google.Chrome'],
  ] as const)('on %s', (_, difference, command) => {
    expect(installCommand(machine(difference))).toBe(command)
  })

  it('on an unknown system still says what to do', () => {
    expect(problemOf(machine({ osRelease: '' })).hint).toMatch(/^install Chromium, Chrome or Edge, or name/)
  })
})

describe('this system', () => {
  it('tells a program from a file and a folder', () => {
    const folder = mkdtempSync(join(tmpdir(), 'stanchion-system-'))
    const { isProgram, list } = thisSystem()
    writeFileSync(join(folder, 'program'), '')
    chmodSync(join(folder, 'program'), 0o755)
    writeFileSync(join(folder, 'file'), '', { mode: 0o644 })
    expect(['program', 'file', 'missing', '.'].map((name) => isProgram(join(folder, name)))).toEqual([
      true,
      false,
      false,
      false,
    ])
    expect([...list(folder)].sort()).toEqual(['file', 'program'])
    expect(list(join(folder, 'missing'))).toEqual([])
    rmSync(folder, { recursive: true })
  })
})
