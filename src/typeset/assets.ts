import { existsSync, readFileSync } from 'node:fs'
import { join } from 'node:path'
import { packageRoot } from '../package-root.ts'

const sansFile = (subset: string, weight: number, style: string) =>
  `@fontsource/source-sans-3/files/source-sans-3-${subset}-${String(weight)}-${style}.woff2`

const TEXT_SUBSETS = ['latin', 'latin-ext', 'greek', 'greek-ext', 'cyrillic', 'cyrillic-ext', 'vietnamese']

const KATEX_FACES = [
  'AMS-Regular',
  'Caligraphic-Bold',
  'Caligraphic-Regular',
  'Fraktur-Bold',
  'Fraktur-Regular',
  'Main-Bold',
  'Main-BoldItalic',
  'Main-Italic',
  'Main-Regular',
  'Math-BoldItalic',
  'Math-Italic',
  'SansSerif-Bold',
  'SansSerif-Italic',
  'SansSerif-Regular',
  'Script-Regular',
  'Size1-Regular',
  'Size2-Regular',
  'Size3-Regular',
  'Size4-Regular',
  'Typewriter-Regular',
]

/** The style sheet of KaTeX. */
export const KATEX_STYLE = 'katex/dist/katex.min.css'

/** A face for ≤, √, ⁴ and their like, which the text face's web files leave out. */
export const SIGNS = '@fontsource/roboto/files/roboto-math-400-normal.woff2'

export const textFace = (subset: string, weight: 400 | 600, style: 'normal' | 'italic'): string =>
  sansFile(subset, weight, style)

export const katexFace = (name: string): string => `katex/dist/fonts/KaTeX_${name}.woff2`

/** Every file that a page may carry inside, as its path in `node_modules`; the build copies them to `dist/assets/`. */
export const ASSETS: readonly string[] = [
  KATEX_STYLE,
  ...KATEX_FACES.map(katexFace),
  ...TEXT_SUBSETS.flatMap((subset) => [
    textFace(subset, 400, 'normal'),
    textFace(subset, 400, 'italic'),
    textFace(subset, 600, 'normal'),
  ]),
  SIGNS,
]

/** The name of an asset in `dist/assets/`: the last part of its path, all of which differ. */
export function assetName(asset: string): string {
  return asset.slice(asset.lastIndexOf('/') + 1)
}

/**
 * Where an asset lies: in `dist/assets/` of the installed package, or in the checkout's `node_modules`.
 *
 * @throws {Error} when it is in neither: the package is not whole
 */
export function assetPath(asset: string): string {
  const root = packageRoot()
  const places = [join(root, 'node_modules', asset), join(root, 'dist', 'assets', assetName(asset))]
  const found = places.find((place) => existsSync(place))
  if (found === undefined)
    throw new Error(`\`${assetName(asset)}\` is missing from the package; install it anew`)
  return found
}

const read = new Map<string, Buffer>()

/** The bytes of an asset; each file is read once. */
export function assetBytes(asset: string): Buffer {
  let bytes = read.get(asset)
  if (bytes === undefined) read.set(asset, (bytes = readFileSync(assetPath(asset))))
  return bytes
}

/** The text of a file in `templates/`; each is read once. */
export function templateText(name: string): string {
  const path = join(packageRoot(), 'templates', name)
  let bytes = read.get(path)
  if (bytes === undefined) read.set(path, (bytes = readFileSync(path)))
  return bytes.toString('utf8')
}
