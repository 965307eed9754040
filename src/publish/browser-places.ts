import { posix, win32 } from 'node:path'
import type { System } from './system.ts'

/** Where a browser may be, best first: puppeteer's cache, the usual places of the platform, then the PATH. */
export function browserPlaces(system: System): string[] {
  return [...cached(system), ...usual(system), ...onPath(system)]
}

function usual(system: System): string[] {
  if (system.platform === 'win32') return onWindows(system)
  if (system.platform === 'darwin') return onMac(system)
  return LINUX_PLACES
}

const LINUX_PLACES = [
  '/usr/bin/chromium',
  '/usr/bin/google-chrome-stable',
  '/usr/bin/google-chrome',
  '/opt/google/chrome/chrome',
  '/usr/lib/chromium/chromium',
  '/usr/lib64/chromium-browser/chromium-browser',
  '/usr/bin/microsoft-edge-stable',
  '/usr/bin/microsoft-edge',
  '/opt/microsoft/msedge/msedge',
  '/snap/bin/chromium',
  // Last: where Chromium is a snap, this is a script that does not start without it.
  '/usr/bin/chromium-browser',
]

const PATH_NAMES = [
  'chromium',
  'google-chrome-stable',
  'google-chrome',
  'chrome',
  'microsoft-edge-stable',
  'microsoft-edge',
  'msedge',
  'chromium-browser',
]

function onMac({ home }: System): string[] {
  const names = ['Chromium', 'Google Chrome', 'Google Chrome for Testing', 'Microsoft Edge']
  return names.flatMap((name) =>
    ['/Applications', posix.join(home, 'Applications')].map(
      (folder) => `${folder}/${name}.app/Contents/MacOS/${name}`,
    ),
  )
}

function onWindows({ env }: System): string[] {
  const folders = [env['PROGRAMFILES'], env['PROGRAMFILES(X86)'], env['LOCALAPPDATA']].filter(
    (folder) => folder !== undefined && folder !== '',
  )
  const programs = [
    'Chromium\\Application\\chrome.exe',
    'Google\\Chrome\\Application\\chrome.exe',
    'Microsoft\\Edge\\Application\\msedge.exe',
  ]
  return programs.flatMap((program) => folders.map((folder) => win32.join(folder as string, program)))
}

function onPath({ platform, env }: System): string[] {
  const windows = platform === 'win32'
  const paths = windows ? win32 : posix
  // An empty entry means the current folder, from which no program is taken.
  const folders = (env['PATH'] ?? env['Path'] ?? '').split(paths.delimiter).filter(Boolean)
  return PATH_NAMES.flatMap((name) =>
    folders.map((folder) => paths.join(folder, windows ? `${name}.exe` : name)),
  )
}

/** Browsers that puppeteer's own installer has put in its cache (`chrome/linux-140.0.7339.80/chrome-linux64/chrome`), newest first. */
function cached(system: System): string[] {
  const paths = system.platform === 'win32' ? win32 : posix
  const join = (...parts: string[]) => paths.join(...parts)
  const cache = system.env['PUPPETEER_CACHE_DIR'] ?? join(system.home, '.cache', 'puppeteer')
  return ['chrome', 'chrome-headless-shell'].flatMap((product) => {
    const builds = [...system.list(join(cache, product))].sort(newestFirst)
    return builds.flatMap((build) => {
      const folders = system.list(join(cache, product, build)).filter((name) => name.startsWith(product))
      return folders.map((folder) => join(cache, product, build, folder, program(system.platform, product)))
    })
  })
}

function program(platform: NodeJS.Platform, product: string): string {
  if (platform === 'win32') return `${product}.exe`
  if (platform !== 'darwin' || product !== 'chrome') return product
  return 'Google Chrome for Testing.app/Contents/MacOS/Google Chrome for Testing'
}

function newestFirst(a: string, b: string): number {
  const numbers = (name: string) => (/-([\d.]+)$/.exec(name)?.[1] ?? '').split('.').map(Number)
  const [left, right] = [numbers(a), numbers(b)]
  const place = left.findIndex((part, i) => part !== right[i])
  return place < 0 ? 0 : (right[place] ?? 0) - (left[place] ?? 0)
}
