import { execFileSync, spawnSync } from 'node:child_process'
import { cpSync, existsSync, mkdtempSync, readFileSync, readdirSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { fileURLToPath } from 'node:url'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'

const ROOT = fileURLToPath(new URL('../..', import.meta.url))

/** A sheet that needs what comes along in the package: a method, a section, a material. */
const SHEET = `---
sheet: P-1
title: Strut from the packed tool
project: Package test
units: metric
---

\`\`\`given
N_Ed = 285 kN # design axial force [invented]
L = 4.60 m # length [invented]
tube = section("CHS 139.7x6.3")
steel = material("S355H EN 10210-1")
\`\`\`

\`\`\`method en1993-1-1/6.3.1 as minor
A = tube.A
f_y = steel.f_y
N_cr = euler_load(steel.E, tube.I, L)
curve = "a"
\`\`\`

\`\`\`check
N_Ed <= minor.N_b_Rd # flexural buckling [EN 1993-1-1 6.3.1.1(1)]
\`\`\`
`

interface Packed {
  readonly filename: string
  readonly files: readonly { readonly path: string; readonly mode: number }[]
}

let folder: string
let packed: Packed
const inFolder = (...names: string[]) => join(folder, ...names)

function npm(args: readonly string[], cwd: string): string {
  // npm sets these for the scripts it runs; a user's own npm has none of them.
  const env = Object.fromEntries(Object.entries(process.env).filter(([name]) => !/^npm_/i.test(name)))
  return execFileSync('npm', args, { cwd, env, encoding: 'utf8', stdio: ['ignore', 'pipe', 'pipe'] })
}

function stanchion(...args: string[]): { status: number | null; stdout: string; stderr: string } {
  return spawnSync(inFolder('node_modules/.bin/stanchion'), args, { cwd: folder, encoding: 'utf8' })
}

beforeAll(() => {
  folder = mkdtempSync(join(tmpdir(), 'stanchion-package-'))
  // The build runs before packing; what it prints goes to standard output first.
  const output = npm(['pack', '--json', '--pack-destination', folder], ROOT)
  ;[packed] = JSON.parse(output.slice(output.search(/^\[\s*$/m))) as [Packed]
  writeFileSync(inFolder('package.json'), '{"name": "office", "private": true, "type": "module"}')
  // An empty cache and no network: the tarball must hold all it needs.
  const offline = ['--offline', '--cache', inFolder('empty-cache'), '--no-audit', '--no-fund']
  npm(['install', ...offline, `./${packed.filename}`], folder)
  writeFileSync(inFolder('strut.md'), SHEET)
})
afterAll(() => rmSync(folder, { recursive: true, force: true }))

describe('the packed package', () => {
  it('holds the command, the library, what they read, the samples and the licence notices, and no more', () => {
    const paths = packed.files.map((file) => file.path)
    const tops = new Set(paths.map((path) => path.replace(/^(src\/[^/]+|[^/]+).*$/, '$1')))
    const own = [...tops].filter((top) => top !== 'node_modules')
    expect(own.sort()).toEqual(
      [
        'LICENSE',
        'README.md',
        'dist',
        'package.json',
        'samples',
        'src/data',
        'src/methods',
        'templates',
      ].filter((name) => existsSync(join(ROOT, name))),
    )
    expect(paths).toEqual(
      expect.arrayContaining(['dist/stanchion.js', 'dist/index.js', 'dist/types/index.d.ts']),
    )
    expect(
      paths.filter((path) => /\.test\.|\.html$|\.pdf$/.test(path) && !path.startsWith('templates/')),
    ).toEqual([])
  })

  it('names the licence of everything bundled', () => {
    const notices = readFileSync(inFolder('node_modules/stanchion/dist/THIRD-PARTY-LICENSES.txt'), 'utf8')
    for (const name of ['katex', 'mathjs', 'puppeteer-core', '@cantoo/pdf-lib', 'unified', 'yaml', 'zod']) {
      expect(notices).toMatch(new RegExp(`^${name} \\d+\\.\\d+\\.\\d+ \\(`, 'm'))
    }
    expect(notices).not.toMatch(/^rehype-katex /m)
  })
})

describe('the package installed in another folder', () => {
  it('needs nothing from a registry and runs no install script', () => {
    const manifest = JSON.parse(readFileSync(inFolder('node_modules/stanchion/package.json'), 'utf8')) as {
      scripts: Record<string, string>
    }
    expect(Object.keys(manifest.scripts).filter((name) => /install$/.test(name))).toEqual([])
    expect(readdirSync(inFolder('node_modules')).filter((name) => !name.startsWith('.'))).toEqual([
      'stanchion',
    ])
  })

  it('prints a sheet with a method and looked-up values to self-contained HTML', () => {
    const { status, stderr } = stanchion('print', 'strut.md', '-o', 'out')
    expect(stderr).not.toMatch(/error/)
    expect([0, 1]).toContain(status)
    const html = readFileSync(inFolder('out/strut.html'), 'utf8')
    expect(html).toContain('Strut from the packed tool')
    expect(html).toContain('data:font/woff2;base64,')
    expect(html).not.toMatch(/(?:src|href)="(?!#|data:)/)
  })

  it('prints the same bytes as from the checkout', () => {
    stanchion('print', 'strut.md', '-o', 'installed')
    const checkout = join(ROOT, 'dist/stanchion.js')
    spawnSync(process.execPath, [checkout, 'print', 'strut.md', '-o', 'checkout'], { cwd: folder })
    expect(readFileSync(inFolder('installed/strut.html'))).toEqual(
      readFileSync(inFolder('checkout/strut.html')),
    )
  })

  it('prints the PDF', () => {
    const { status, stderr } = stanchion('print', 'strut.md', '--pdf', '-o', 'out')
    expect(status, stderr).toBeLessThan(2)
    expect(readFileSync(inFolder('out/strut.pdf')).subarray(0, 5).toString()).toBe('%PDF-')
  })

  it('lists its methods and explains one', () => {
    expect(stanchion('methods').stdout).toContain('en1993-1-1-2005/6.3.1')
    expect(stanchion('explain', 'en1993-1-1-2005/6.3.1').status).toBe(0)
  })

  it('calculates its own samples', () => {
    cpSync(inFolder('node_modules/stanchion/samples'), inFolder('samples'), { recursive: true })
    const sheets = readdirSync(inFolder('samples'), { recursive: true, encoding: 'utf8' })
      .filter((name) => name.endsWith('.md'))
      .map((name) => join('samples', name))
      .filter((name) => /^sheet:/m.test(readFileSync(inFolder(name), 'utf8').split('\n---')[0] ?? ''))
    expect(sheets.length).toBeGreaterThanOrEqual(4)
    const { status, stderr } = stanchion('check', ...sheets)
    expect(status, stderr).toBeLessThan(2)
  })

  it('can be used as a library, with types that stand alone', () => {
    writeFileSync(
      inFolder('use.ts'),
      `import * as stanchion from 'stanchion'\nexport const names: string[] = Object.keys(stanchion)\n`,
    )
    const complaints = (module: string, moduleResolution: string) => {
      const options = { noEmit: true, strict: true, target: 'es2022', types: [], module, moduleResolution }
      writeFileSync(
        inFolder('tsconfig.json'),
        JSON.stringify({ compilerOptions: options, files: ['use.ts'] }),
      )
      const tsc = [join(ROOT, 'node_modules/typescript/bin/tsc'), '--project', folder]
      return spawnSync(process.execPath, tsc, { encoding: 'utf8' }).stdout
    }
    expect(complaints('esnext', 'bundler')).toBe('')
    expect(complaints('nodenext', 'nodenext')).toBe('')
    const names = execFileSync(
      process.execPath,
      ['--input-type=module', '-e', 'console.log(Object.keys(await import("stanchion")).length)'],
      { cwd: folder, encoding: 'utf8' },
    )
    expect(Number(names)).toBeGreaterThan(0)
  })

  it('is run by npx, here and in the checkout', () => {
    expect(npm(['exec', '--offline', '--', 'stanchion', 'methods'], folder)).toContain(
      'en1993-1-1-2005/6.3.1',
    )
    expect(npm(['exec', '--offline', '--', 'stanchion', 'methods'], ROOT)).toContain('en1993-1-1-2005/6.3.1')
  })
})
