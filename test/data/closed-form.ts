/**
 * Properties of sections from their nominal dimensions, by integration of the outline: the outside route by which the
 * tables are checked. A corner of radius R is a square less a quarter circle (area (1 - π/4) R², centroid and second moment
 * by elementary integration).
 */
const CORNER_AREA = 1 - Math.PI / 4
/** Distance of the corner piece's centroid from the corner, over R. */
const CORNER_CENTROID = (10 - 3 * Math.PI) / (12 - 3 * Math.PI)
/** Second moment of the corner piece about its own centroid, over R⁴. */
const CORNER_SECOND = 1 / 3 - Math.PI / 16 - 1 / (3 * (12 - 3 * Math.PI))

/** A circular tube of outside diameter D and wall t: area and second moment of area. */
export function tube(D: number, t: number): { A: number; I: number } {
  const d = D - 2 * t
  return { A: (Math.PI / 4) * (D ** 2 - d ** 2), I: (Math.PI / 64) * (D ** 4 - d ** 4) }
}

/** A rectangular tube H by B with outside and inside corner radii; I_x is about the axis parallel to B. */
export function box(H: number, B: number, t: number, outer: number, inner: number) {
  const [out, hole] = [rounded(H, B, outer), rounded(H - 2 * t, B - 2 * t, inner)]
  return { A: out.A - hole.A, I_x: out.I_x - hole.I_x, I_y: out.I_y - hole.I_y }
}

function rounded(h: number, b: number, R: number) {
  const corner = (half: number) =>
    CORNER_SECOND * R ** 4 + CORNER_AREA * R ** 2 * (half - CORNER_CENTROID * R) ** 2
  return {
    A: h * b - 4 * CORNER_AREA * R ** 2,
    I_x: (b * h ** 3) / 12 - 4 * corner(h / 2),
    I_y: (h * b ** 3) / 12 - 4 * corner(b / 2),
  }
}

/** A doubly symmetric I-section with root radius r; I_w is that of the flanges alone, as the European tables print it. */
export function iSection(h: number, b: number, t_w: number, t_f: number, r: number) {
  const fillet = (arm: number) => CORNER_SECOND * r ** 4 + CORNER_AREA * r ** 2 * arm ** 2
  const [inside, centroid] = [h - 2 * t_f, CORNER_CENTROID * r]
  return {
    A: 2 * b * t_f + inside * t_w + 4 * CORNER_AREA * r ** 2,
    I_y: (b * h ** 3 - (b - t_w) * inside ** 3) / 12 + 4 * fillet(h / 2 - t_f - centroid),
    I_z: (2 * t_f * b ** 3 + inside * t_w ** 3) / 12 + 4 * fillet(t_w / 2 + centroid),
    I_w: ((t_f * b ** 3) / 24) * (h - t_f) ** 2,
  }
}
