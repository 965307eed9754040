import { existsSync, readFileSync } from 'node:fs'
import { expect, test } from 'vitest'
import { readmeCommands } from '../src/cli/readme-commands.ts'
import { prepareSheet } from '../src/pipeline.ts'

const root = new URL('..', import.meta.url).pathname
const read = (name: string) => readFileSync(root + name, 'utf8')

test('every path that DEVELOPERS.md names exists', () => {
  const paths = [
    ...read('DEVELOPERS.md').matchAll(/`((?:src|test|templates|samples|\.config|\.ci)\/[^`<>*]*)`/g),
  ].map((match) => match[1] as string)
  expect(paths.length).toBeGreaterThan(30)
  expect(paths.filter((path) => !existsSync(root + path))).toEqual([])
})

test('every dependency has its sentence in DEVELOPERS.md', () => {
  const { dependencies = {}, devDependencies = {} } = JSON.parse(read('package.json')) as Record<
    string,
    Record<string, string>
  >
  const tools =
    /^(@types\/|@fontsource\/|eslint|typescript|prettier|vite|vitest|fast-check|rolldown|commonmark|pdfjs-dist|rehype-katex|vfile$|gfm)/
  const text = read('DEVELOPERS.md')
  const missing = [...Object.keys(dependencies), ...Object.keys(devDependencies)].filter(
    (name) => !tools.test(name) && !text.includes(name),
  )
  expect(missing).toEqual([])
})

test('the README’s commands are those of the program (npm run docs writes them)', () => {
  const between = /<!-- commands -->\n([\s\S]*?)<!-- \/commands -->/.exec(read('README.md'))?.[1]
  expect(between?.trim()).toBe(readmeCommands().trim())
})

test('the sheet in the README is calculated and passes', () => {
  const sheet = /````markdown\n([\s\S]*?)````/.exec(read('README.md'))?.[1] ?? ''
  const { verdict, findings } = prepareSheet({ path: 'readme.md', text: sheet }, { cwd: root })
  expect(verdict).toBe('pass')
  expect(findings.map(({ ruleId }) => ruleId)).toEqual(['hold-open'])
})

test('the README gives the test command and its picture exists', () => {
  const text = read('README.md')
  expect(text).toContain('npm test')
  for (const [, picture] of text.matchAll(/!\[[^\]]*\]\(([^)]+)\)/g))
    expect(existsSync(root + picture)).toBe(true)
})
