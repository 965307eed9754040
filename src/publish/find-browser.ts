import { browserPlaces } from './browser-places.ts'
import { installCommand } from './install-command.ts'
import { PublishProblem } from './publish-problem.ts'
import { thisSystem, type System } from './system.ts'

/** The environment variables that name a browser, first come first served. */
const VARIABLES = ['STANCHION_BROWSER', 'PUPPETEER_EXECUTABLE_PATH'] as const

/**
 * Finds a browser of the Chromium family: the one asked for, else by environment variable, else in puppeteer's cache
 * and the usual places of this system.
 *
 * @param asked the path the user gave, if any
 * @returns the path of the program
 * @throws {PublishProblem} `browser-missing`, with the command that installs one here, or saying which given path is wrong
 */
export function findBrowser(asked?: string, system: System = thisSystem()): string {
  const named = nameGiven(asked, system)
  if (named) {
    if (system.isProgram(named.path)) return named.path
    throw new PublishProblem(
      'browser-missing',
      `the browser \`${named.path}\` given by ${named.by} is not a program that can be run`,
      `correct ${named.by}, or leave it out to have a browser looked for`,
    )
  }
  const found = browserPlaces(system).find((place) => system.isProgram(place))
  if (found) return found
  throw new PublishProblem(
    'browser-missing',
    'no browser of the Chromium family was found; the PDF is printed by one',
    browserHint(system),
  )
}

function nameGiven(asked: string | undefined, { env }: System): { path: string; by: string } | undefined {
  if (asked) return { path: asked, by: '`--browser`' }
  for (const variable of VARIABLES) {
    const path = env[variable]
    if (path) return { path, by: `the environment variable ${variable}` }
  }
  return undefined
}

/** One act that gives this system a browser that starts. */
export function browserHint(system: System = thisSystem()): string {
  const command = installCommand(system)
  const own = 'name the program in the environment variable STANCHION_BROWSER'
  return command ? `run \`${command}\`, or ${own}` : `install Chromium, Chrome or Edge, or ${own}`
}
