/** How the rows of cells lie about their mean: how many they are, and the means of the squares and cubes of their distances. */
export interface WithinCells {
  readonly rows: Float64Array
  readonly squares: Float64Array
  readonly cubes: Float64Array
}

/** Room for one regression, kept from place to place: a run asks for thousands. */
export interface Scratch {
  /** Normal equations of a cubic, 4 by 4, below the diagonal and on it; a lower degree takes their first rows. */
  readonly normal: Float64Array
  readonly right: Float64Array
  readonly factor: Float64Array
  /** After `solve`: the coefficients of the polynomial. */
  readonly coefficients: Float64Array
}

export const scratch = (): Scratch => ({
  normal: new Float64Array(16),
  right: new Float64Array(4),
  factor: new Float64Array(16),
  coefficients: new Float64Array(4),
})

export function sumRows(
  x: Float64Array,
  y: Float64Array,
  at: number,
  first: number,
  last: number,
  width: number,
  offset: number,
  { normal, right }: Scratch,
): void {
  let s0 = 0
  let s1 = 0
  let s2 = 0
  let s3 = 0
  let s4 = 0
  let s5 = 0
  let s6 = 0
  let t0 = 0
  let t1 = 0
  let t2 = 0
  let t3 = 0
  for (let j = first; j <= last; j++) {
    const u = ((x[j] as number) - at) / width
    const distance = Math.abs(u)
    if (distance >= 1) continue
    const falling = 1 - distance * distance * distance
    const w = falling * falling * falling
    const v = w * ((y[j] as number) - offset)
    const u2 = u * u
    const wu2 = w * u2
    const wu4 = wu2 * u2
    s0 += w
    s1 += w * u
    s2 += wu2
    s3 += wu2 * u
    s4 += wu4
    s5 += wu4 * u
    s6 += wu4 * u2
    t0 += v
    t1 += v * u
    t2 += v * u2
    t3 += v * u2 * u
  }
  normal[0] = s0
  normal[4] = s1
  normal[5] = s2
  normal[8] = s2
  normal[9] = s3
  normal[10] = s4
  normal[12] = s3
  normal[13] = s4
  normal[14] = s5
  normal[15] = s6
  right[0] = t0
  right[1] = t1
  right[2] = t2
  right[3] = t3
}

/** The mean of a polynomial over a cell is not its value at the mean x: the regression is on the means of the powers. */
export function sumCells(
  x: Float64Array,
  y: Float64Array,
  { rows, squares, cubes }: WithinCells,
  at: number,
  first: number,
  last: number,
  width: number,
  offset: number,
  { normal, right }: Scratch,
): void {
  let s00 = 0
  let s10 = 0
  let s11 = 0
  let s20 = 0
  let s21 = 0
  let s22 = 0
  let s30 = 0
  let s31 = 0
  let s32 = 0
  let s33 = 0
  let t0 = 0
  let t1 = 0
  let t2 = 0
  let t3 = 0
  const perWidth = 1 / width
  for (let j = first; j <= last; j++) {
    const u = ((x[j] as number) - at) * perWidth
    const distance = Math.abs(u)
    if (distance >= 1) continue
    const falling = 1 - distance * distance * distance
    const w = falling * falling * falling * (rows[j] as number)
    const square = (squares[j] as number) * perWidth * perWidth
    const p2 = u * u + square
    const p3 = u * (u * u + 3 * square) + (cubes[j] as number) * perWidth * perWidth * perWidth
    const v = w * ((y[j] as number) - offset)
    const w1 = w * u
    const w2 = w * p2
    const w3 = w * p3
    s00 += w
    s10 += w1
    s11 += w1 * u
    s20 += w2
    s21 += w2 * u
    s22 += w2 * p2
    s30 += w3
    s31 += w3 * u
    s32 += w3 * p2
    s33 += w3 * p3
    t0 += v
    t1 += v * u
    t2 += v * p2
    t3 += v * p3
  }
  normal[0] = s00
  normal[4] = s10
  normal[5] = s11
  normal[8] = s20
  normal[9] = s21
  normal[10] = s22
  normal[12] = s30
  normal[13] = s31
  normal[14] = s32
  normal[15] = s33
  right[0] = t0
  right[1] = t1
  right[2] = t2
  right[3] = t3
}

/** The coefficients of the weighted polynomial, by Cholesky's factors; the degree is lowered where the points do not carry it. Returns how many there are. */
export function solve({ normal, right, factor: l, coefficients: c }: Scratch, degree: number): number {
  let size = 0
  for (; size <= degree; size++) {
    // Each row of the factor is that of every larger one: the first that is not carried ends it.
    const row = 4 * size
    for (let j = 0; j < size; j++) {
      let rest = normal[row + j] as number
      for (let k = 0; k < j; k++) rest -= (l[row + k] as number) * (l[4 * j + k] as number)
      l[row + j] = rest / (l[4 * j + j] as number)
    }
    const diagonal = normal[row + size] as number
    let rest = diagonal
    for (let k = 0; k < size; k++) rest -= (l[row + k] as number) * (l[row + k] as number)
    if (!(rest > 1e-13 * diagonal)) break
    l[row + size] = Math.sqrt(rest)
  }
  for (let i = 0; i < size; i++) {
    let rest = right[i] as number
    for (let k = 0; k < i; k++) rest -= (l[4 * i + k] as number) * (c[k] as number)
    c[i] = rest / (l[4 * i + i] as number)
  }
  for (let i = size - 1; i >= 0; i--) {
    let rest = c[i] as number
    for (let k = i + 1; k < size; k++) rest -= (l[4 * k + i] as number) * (c[k] as number)
    c[i] = rest / (l[4 * i + i] as number)
  }
  return size
}
