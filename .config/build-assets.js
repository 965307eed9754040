import { copyFileSync, mkdirSync } from 'node:fs'
import { join } from 'node:path'
import { importSource } from './import-source.js'

/**
 * Copies the fonts and style sheets that a page carries inside, and returns where they came from.
 * @param {string} root the package root
 * @param {string} target
 */
export async function copyAssets(root, target) {
  const { ASSETS, assetName } = await importSource('src/typeset/assets.ts')
  mkdirSync(target, { recursive: true })
  const names = new Set(ASSETS.map(assetName))
  if (names.size !== ASSETS.length)
    throw new Error('two assets have the same name, and dist/assets/ has room for one')
  return ASSETS.map((asset) => {
    const source = join(root, 'node_modules', asset)
    copyFileSync(source, join(target, assetName(asset)))
    return source
  })
}
