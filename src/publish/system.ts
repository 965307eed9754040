import { accessSync, constants, readFileSync, readdirSync, statSync } from 'node:fs'
import { homedir } from 'node:os'

/** What the search for a browser asks of the machine; a test gives its own. */
export interface System {
  readonly platform: NodeJS.Platform
  readonly env: Readonly<Record<string, string | undefined>>
  readonly home: string
  /** Running as root, which needs no `sudo` and cannot use the browser's sandbox. */
  readonly root: boolean
  /** The text of /etc/os-release, empty where there is none. */
  readonly osRelease: string
  /** Whether there is a file at the path that may be run. */
  readonly isProgram: (path: string) => boolean
  /** The names in a folder; none when it does not exist. */
  readonly list: (folder: string) => readonly string[]
}

export function thisSystem(): System {
  return {
    platform: process.platform,
    env: process.env,
    home: homedir(),
    root: process.getuid?.() === 0,
    osRelease: readOr('/etc/os-release', ''),
    isProgram,
    list: (folder) => (statSync(folder, { throwIfNoEntry: false })?.isDirectory() ? readdirSync(folder) : []),
  }
}

function isProgram(path: string): boolean {
  try {
    accessSync(path, constants.X_OK)
    return statSync(path).isFile()
  } catch {
    return false
  }
}

function readOr(path: string, otherwise: string): string {
  try {
    return readFileSync(path, 'utf8')
  } catch {
    return otherwise
  }
}
