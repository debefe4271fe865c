/**
 * The time that one call takes: the median of several batches, after one that warms up.
 * @returns microseconds
 */
export function microseconds(work: () => unknown, calls: number, batches = 15): number {
  const times: number[] = []
  for (let batch = -1; batch < batches; batch += 1) {
    const began = performance.now()
    for (let call = 0; call < calls; call += 1) work()
    if (batch >= 0) times.push((performance.now() - began) * 1_000 / calls)
  }
  return times.sort((a, b) => a - b)[Math.floor(times.length / 2)]!
}
