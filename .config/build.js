// Builds the package into dist/: the command, the library, its type declarations, the fonts and the licence notices.
import { chmodSync, existsSync, mkdtempSync, renameSync, rmSync, writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { fileURLToPath } from 'node:url'
import { rolldown } from 'rolldown'
import { copyAssets } from './build-assets.js'
import { licenceNotices } from './build-licences.js'
import { writeTypes } from './build-types.js'

const ROOT = fileURLToPath(new URL('..', import.meta.url))
// Built aside and moved in when complete, so that whoever runs the command meanwhile finds the old one or the new.
const ASIDE = mkdtempSync(join(ROOT, 'node_modules', '.stanchion-'))
const DIST = join(ASIDE, 'dist')
process.on('exit', () => rmSync(ASIDE, { recursive: true, force: true }))

/**
 * The command starts here, to say so when Node is too old to read the rest. Node's compile cache is left off: it lies in a
 * folder that others may write to, and the command writes nothing that it was not asked for.
 */
const LAUNCHER = `#!/usr/bin/env node
const [major, minor] = process.versions.node.split('.').map(Number)
if (major < 20 || (major === 20 && minor < 19)) {
  console.error('stanchion: this is Node ' + process.versions.node + '; Node 20.19 or later is needed')
  process.exit(2)
}
await import('./cli.js')
`

const bundle = await rolldown({
  cwd: ROOT,
  input: { cli: 'src/cli/main.ts', index: 'src/index.ts' },
  platform: 'node',
  // Node's own modules stay outside; everything else comes along, so that the package installs nothing else.
  external: [/^node:/],
  onLog: (level, log, print) => {
    if (log.code === 'UNRESOLVED_IMPORT') throw new Error(log.message)
    print(level, log)
  },
})
const { output } = await bundle.write({
  dir: DIST,
  format: 'esm',
  entryFileNames: '[name].js',
  chunkFileNames: 'chunks/[name]-[hash].js',
  // Modules that commands share would be cut into many small files, which read more slowly: the stages are one file, and
  // what is needed before a command is known stays out of it.
  codeSplitting: {
    groups: [
      { name: 'common', test: /src.(quantity.nearest-name|version|package-root)\.ts$/, priority: 2 },
      { name: 'pipeline', test: /src.pipeline\.ts$/, priority: 1 },
    ],
  },
})
await bundle.close()

writeFileSync(join(DIST, 'stanchion.js'), LAUNCHER)
chmodSync(join(DIST, 'stanchion.js'), 0o755)
const assets = await copyAssets(ROOT, join(DIST, 'assets'))
const modules = output.flatMap((chunk) => (chunk.type === 'chunk' ? chunk.moduleIds : []))
writeFileSync(join(DIST, 'THIRD-PARTY-LICENSES.txt'), licenceNotices([...modules, ...assets]))
writeTypes(ROOT, join(DIST, 'types'))

const current = join(ROOT, 'dist')
if (existsSync(current)) renameSync(current, join(ASIDE, 'old'))
renameSync(DIST, current)
