import type { Nodes } from 'hast'

/** What a page shows, as far as it decides which faces it has to carry. */
export interface Seen {
  /** Code points in ordinary text. */
  readonly text: ReadonlySet<number>
  /** Faces of KaTeX, such as `Math-Italic`. */
  readonly math: ReadonlySet<string>
}

/** The face that each class of KaTeX's style sheet asks for, besides `Main-Regular`. */
export const FACE_OF_CLASS: Readonly<Record<string, string>> = {
  amsrm: 'AMS-Regular',
  boldsymbol: 'Math-BoldItalic',
  'delim-size1': 'Size1-Regular',
  'delim-size4': 'Size4-Regular',
  'large-op': 'Size2-Regular',
  mathbb: 'AMS-Regular',
  mathbf: 'Main-Bold',
  mathboldfrak: 'Fraktur-Bold',
  mathboldsf: 'SansSerif-Bold',
  mathcal: 'Caligraphic-Regular',
  mathfrak: 'Fraktur-Regular',
  mathit: 'Main-Italic',
  mathitsf: 'SansSerif-Italic',
  mathnormal: 'Math-Italic',
  mathscr: 'Script-Regular',
  mathsf: 'SansSerif-Regular',
  mathsfit: 'SansSerif-Italic',
  mathtt: 'Typewriter-Regular',
  'small-op': 'Size1-Regular',
  textbb: 'AMS-Regular',
  textbf: 'Main-Bold',
  textboldfrak: 'Fraktur-Bold',
  textboldsf: 'SansSerif-Bold',
  textfrak: 'Fraktur-Regular',
  textit: 'Main-Italic',
  textitsf: 'SansSerif-Italic',
  textscr: 'Script-Regular',
  textsf: 'SansSerif-Regular',
  texttt: 'Typewriter-Regular',
}

const SIZE = /^size[1-4]$/

/** Goes over the tree once and notes the characters of its text and the faces of its mathematics. */
export function charactersSeen(tree: Nodes): Seen {
  const text = new Set<number>()
  const math = new Set<string>()
  const walk = (node: Nodes, inMath: boolean): void => {
    if (node.type === 'text') {
      if (!inMath) for (let i = 0; i < node.value.length; i++) text.add(node.value.codePointAt(i) ?? 0)
      return
    }
    if (node.type !== 'element' && node.type !== 'root') return
    let inside = inMath
    if (node.type === 'element') {
      if (node.tagName === 'style' || node.tagName === 'math') return
      const classes = node.properties.className
      if (Array.isArray(classes)) {
        if (classes.includes('katex')) inside = true
        if (inside) facesOf(classes, math)
      }
    }
    for (const child of node.children) walk(child, inside)
  }
  walk(tree, false)
  return { text, math }
}

function facesOf(classes: readonly string[], faces: Set<string>): void {
  for (const name of classes) {
    const face = Object.hasOwn(FACE_OF_CLASS, name) ? FACE_OF_CLASS[name] : undefined
    if (face !== undefined) faces.add(face)
  }
  if (classes.includes('textbf') && classes.includes('textit')) faces.add('Main-BoldItalic')
  if (classes.includes('mathbf') && classes.includes('mathcal')) faces.add('Caligraphic-Bold')
  const size = classes.includes('delimsizing') ? classes.find((name) => SIZE.test(name)) : undefined
  if (size !== undefined) faces.add(`Size${size.slice(4)}-Regular`)
}
