/** Greek letters that names of a sheet spell out, with the TeX for each. `pi` is a constant of the language, not a name. */
const LETTERS =
  'alpha beta gamma delta epsilon zeta eta theta iota kappa lambda mu nu xi pi rho sigma tau upsilon phi chi psi omega ' +
  'Gamma Delta Theta Lambda Xi Pi Sigma Upsilon Phi Psi Omega'

/** Capitals that look like Latin ones, and omicron: upright, so that they differ from the italic Latin letter. */
const LATIN_LOOKING: Readonly<Record<string, string>> = {
  Alpha: 'A',
  Beta: 'B',
  Epsilon: 'E',
  Zeta: 'Z',
  Eta: 'H',
  Iota: 'I',
  Kappa: 'K',
  Mu: 'M',
  Nu: 'N',
  Omicron: 'O',
  Rho: 'P',
  Tau: 'T',
  Chi: 'X',
}

const GREEK: ReadonlyMap<string, string> = new Map([
  ...LETTERS.split(' ').map((name) => [name, `\\${name}`] as const),
  // The shapes that engineering text uses: ε and φ with an open stroke would be taken for other symbols.
  ['epsilon', '\\varepsilon'],
  ['phi', '\\varphi'],
  ['omicron', 'o'],
  ...Object.entries(LATIN_LOOKING).map(([name, letter]) => [name, `\\mathrm{${letter}}`] as const),
])

/** The TeX of a spelled Greek letter; undefined for any other text. */
export function greekTex(name: string): string | undefined {
  return GREEK.get(name)
}
