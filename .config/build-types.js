import { spawnSync } from 'node:child_process'
import { mkdirSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs'
import { dirname, join, relative } from 'node:path'

const SPECIFIER = /(?<=(?:from |import\()['"])[^'"]+(?=['"])/g

/**
 * Writes the type declarations that the library's `index.d.ts` leads to, and no others.
 * @param {string} root the package root
 * @param {string} target
 * @throws when the types are wrong, or need a package that does not come along in the tarball
 */
export function writeTypes(root, target) {
  const made = mkdtempSync(join(root, 'node_modules', '.stanchion-'))
  try {
    const tsc = [
      join(root, 'node_modules/typescript/bin/tsc'),
      '--project',
      join(root, '.config/tsconfig.types.json'),
    ]
    const { status } = spawnSync(process.execPath, [...tsc, '--outDir', made], { stdio: 'inherit' })
    if (status !== 0) throw new Error('the type declarations could not be made')
    const { files, packages } = reachable(join(made, 'index.d.ts'))
    mustComeAlong(packages, JSON.parse(readFileSync(join(root, 'package.json'), 'utf8')))
    for (const [file, text] of files) {
      const path = join(target, relative(made, file))
      mkdirSync(dirname(path), { recursive: true })
      writeFileSync(path, text)
    }
  } finally {
    rmSync(made, { recursive: true, force: true })
  }
}

function reachable(start) {
  const files = new Map()
  const packages = new Set()
  const open = [start]
  while (open.length > 0) {
    const file = open.pop()
    if (files.has(file)) continue
    const source = readFileSync(file, 'utf8')
    // Declarations are found under the names of the modules they would belong to.
    const text = source.replace(SPECIFIER, (name) =>
      name.startsWith('.') ? name.replace(/\.ts$/, '.js') : name,
    )
    files.set(file, text)
    for (const [name] of source.matchAll(SPECIFIER)) {
      if (name.startsWith('.')) open.push(join(dirname(file), name.replace(/\.ts$/, '.d.ts')))
      else if (!name.startsWith('node:')) packages.add(name)
    }
  }
  return { files, packages }
}

function mustComeAlong(packages, { bundleDependencies = [] }) {
  for (const name of packages) {
    if (bundleDependencies.includes(name) || bundleDependencies.includes(`@types/${name}`)) continue
    throw new Error(
      `the library's types use ${name}; add it to dependencies and bundleDependencies, or hide it`,
    )
  }
}
