/** Three parameters, or three slopes by them. */
export type Triple = [number, number, number]

/** One weighed residual and its slopes by the three parameters. */
export interface Row {
  residual: number
  slopes: Triple
}

const MOST_STEPS = 200
const MOST_HALVINGS = 40
const SMALLEST_STEP = 1e-12

/**
 * Least squares in three parameters by Gauss and Newton's method, each step
 * halved until the sum of squares falls. The residuals must bind all three
 * parameters (JᵀJ of full rank). Gives the solution and (JᵀJ)⁻¹ at it.
 */
export function gaussNewton(start: Triple, rowsAt: (guess: Triple) => Row[]): { solution: Triple, covariance: Triple[] } {
  let solution = start
  let rows = rowsAt(solution)
  for (let count = 0; count < MOST_STEPS; count += 1) {
    const step = multiply(inverse(normalMatrix(rows)), descent(rows))
    const next = shorten(solution, step, squares(rows), rowsAt)
    if (next === null) {
      break
    }
    solution = next.solution
    rows = next.rows
    if (Math.max(...step.map(Math.abs)) < SMALLEST_STEP) {
      break
    }
  }
  return { solution, covariance: inverse(normalMatrix(rows)) }
}

/** The first of the full step, its half, its quarter … that lowers the sum of squares; null if none does. */
function shorten(from: Triple, step: Triple, before: number, rowsAt: (guess: Triple) => Row[]) {
  for (let halving = 0, part = 1; halving < MOST_HALVINGS; halving += 1, part /= 2) {
    const solution = from.map((value, index) => value + part * step[index]!) as Triple
    const rows = rowsAt(solution)
    if (squares(rows) < before) {
      return { solution, rows }
    }
  }
  return null
}

function squares(rows: Row[]): number {
  return rows.reduce((sum, row) => sum + row.residual ** 2, 0)
}

function normalMatrix(rows: Row[]): Triple[] {
  return [0, 1, 2].map(i => [0, 1, 2].map(j =>
    rows.reduce((sum, { slopes }) => sum + slopes[i]! * slopes[j]!, 0)) as Triple)
}

function descent(rows: Row[]): Triple {
  return [0, 1, 2].map(i => -rows.reduce((sum, row) => sum + row.slopes[i]! * row.residual, 0)) as Triple
}

function multiply(matrix: Triple[], vector: Triple): Triple {
  return matrix.map(row => row.reduce((sum, value, index) => sum + value * vector[index]!, 0)) as Triple
}

/** Inverse of a symmetric matrix of three rows by its cofactors. */
function inverse(matrix: Triple[]): Triple[] {
  const [[a, b, c], [, d, e], [, , f]] = matrix as [Triple, Triple, Triple]
  const first: Triple = [d * f - e * e, c * e - b * f, b * e - c * d]
  const determinant = a * first[0] + b * first[1] + c * first[2]
  const crossed = b * c - a * e
  return [
    first,
    [first[1], a * f - c * c, crossed],
    [first[2], crossed, a * d - b * b],
  ].map(row => row.map(value => value / determinant) as Triple)
}
