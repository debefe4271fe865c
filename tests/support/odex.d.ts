/** The little that tests ask of the solver; its own sources do not pass our compiler. */
export class Solver {
  constructor(dimension: number)
  absoluteTolerance: number
  relativeTolerance: number
  maxSteps: number
  solve(slopes: (x: number, y: number[]) => number[], from: number, start: number[], to: number): { y: number[], outcome: number }
}
