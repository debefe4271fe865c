/** The little that tests ask of reference libraries that bring no usable types of their own. */
declare module 'odex' {
  export class Solver {
    constructor(dimension: number)
    absoluteTolerance: number
    relativeTolerance: number
    maxSteps: number
    solve(slopes: (x: number, y: number[]) => number[], from: number, start: number[], to: number): { y: number[], outcome: number }
  }
}

declare module 'jstat' {
  const jStat: {
    beta: { cdf: (x: number, alpha: number, beta: number) => number }
    normal: { cdf: (x: number, mean: number, sd: number) => number, inv: (p: number, mean: number, sd: number) => number }
  }
  export default jStat
}
