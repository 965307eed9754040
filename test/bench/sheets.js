// The sheets that are measured: made of groups of five equations and one check, as a strength curve needs them.

const GROUP = 5

/**
 * A sheet of `count` equations, a multiple of five, each with its own numbers.
 * @param {number} count
 */
export function sheetOf(count) {
  const groups = Array.from({ length: count / GROUP }, (_, i) => i + 1)
  return `---
sheet: B-${count}
title: Strut of ${count} equations
project: Bench
units: metric
paper: A4
---

# Inputs

\`\`\`given
N_Ed = 85 kN # design axial force [invented]
L = 4.60 m # length between bearings [invented]
E = 210 GPa # modulus of elasticity [invented]
I = 589 cm^4 # second moment of area [invented]
A = 26.4 cm^2 # area [invented]
f_y = 355 MPa # yield strength [invented]
\`\`\`

${groups.map(group).join('\n')}`
}

function group(i) {
  return `# Length ${i}

The length is increased step by step.

\`\`\`working
L_${i} = (1 + ${i} / 10000) * L # buckling length
N_cr${i} = pi^2 * E * I / L_${i}^2 # critical load [E1]
lambda_${i} = sqrt(A * f_y / N_cr${i}) # slenderness
Phi_${i} = 0.5 * (1 + 0.21 * (lambda_${i} - 0.2) + lambda_${i}^2)
chi_${i} = min(1, 1 / (Phi_${i} + sqrt(Phi_${i}^2 - lambda_${i}^2))) # reduction factor
\`\`\`

\`\`\`check
N_Ed <= chi_${i} * A * f_y # flexural buckling [E2]
\`\`\`
`
}

/** The display equations of a printed page as TeX, which KaTeX leaves in the MathML. */
export function displayEquations(html) {
  const blocks = html.match(/<math[^>]*display="block"[\s\S]*?<\/math>/g) ?? []
  return blocks.flatMap((block) => {
    const tex = /<annotation encoding="application\/x-tex">([\s\S]*?)<\/annotation>/.exec(block)?.[1]
    return tex === undefined ? [] : decode(tex)
  })
}

function decode(text) {
  const named = { amp: '&', lt: '<', gt: '>', quot: '"' }
  return text
    .replace(/&#x([0-9a-f]+);/gi, (_, hex) => String.fromCodePoint(parseInt(hex, 16)))
    .replace(/&#(\d+);/g, (_, digits) => String.fromCodePoint(Number(digits)))
    .replace(/&(amp|lt|gt|quot);/g, (_, name) => named[name])
}

/** The same equations as ordinary Markdown. */
export function plainMarkdown(equations) {
  return equations.map((tex, i) => `Equation ${i + 1}.\n\n$$\n${tex}\n$$\n`).join('\n')
}
