/** The little that tests ask of a reference library that brings no usable types of its own. */
declare module 'jstat' {
  const jStat: {
    beta: { cdf: (x: number, alpha: number, beta: number) => number }
    normal: { cdf: (x: number, mean: number, sd: number) => number, inv: (p: number, mean: number, sd: number) => number }
  }
  export default jStat
}
