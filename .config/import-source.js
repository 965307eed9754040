import { mkdtempSync, rmSync } from 'node:fs'
import { join } from 'node:path'
import { fileURLToPath, pathToFileURL } from 'node:url'
import { rolldown } from 'rolldown'

const ROOT = fileURLToPath(new URL('..', import.meta.url))

/**
 * Bundles a TypeScript source, for scripts that run without the test runner. The bundle lies in the checkout, so that the
 * program finds its own package folder, and is removed when the script ends.
 * @param {string} source path from the package root
 * @returns {Promise<string>} the path of the bundle
 */
export async function bundleSource(source) {
  const folder = mkdtempSync(join(ROOT, 'node_modules', '.stanchion-'))
  process.on('exit', () => rmSync(folder, { recursive: true, force: true }))
  const bundle = await rolldown({ cwd: ROOT, input: { entry: source }, platform: 'node', logLevel: 'warn' })
  await bundle.write({ dir: folder, format: 'esm' })
  await bundle.close()
  return join(folder, 'entry.js')
}

/** @param {string} source path from the package root */
export async function importSource(source) {
  return import(pathToFileURL(await bundleSource(source)).href)
}
