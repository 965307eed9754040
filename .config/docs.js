// Writes the parts of the README that come from the program's records.
import { readFileSync, writeFileSync } from 'node:fs'
import { fileURLToPath } from 'node:url'
import { importSource } from './import-source.js'

const README = fileURLToPath(new URL('../README.md', import.meta.url))
const { readmeCommands } = await importSource('src/cli/readme-commands.ts')
const text = readFileSync(README, 'utf8')
const section = /<!-- commands -->\n[\s\S]*?<!-- \/commands -->/
if (!section.test(text))
  throw new Error('README.md has no section between <!-- commands --> and <!-- /commands -->')
writeFileSync(
  README,
  text.replace(section, () => `<!-- commands -->\n${readmeCommands()}<!-- /commands -->`),
)
