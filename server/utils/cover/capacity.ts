import type { Compressor, CoverInput, CoverLoad } from '~~/shared/schemas/cover'

/** Change of capacity per K of suction about the target, as a part of it. Our own estimates. */
export const DEFAULT_SLOPE_PER_K = { medium: 0.03, low: 0.04 } as const
const WATTS_PER_KW = 1000

/**
 * Capacity of one machine in kW at a saturated suction temperature in °C, never
 * below 0: linear about the target, or by the ten coefficients of AHRI Standard
 * 540 (W, °C); a machine on a drive in proportion to its speed.
 */
export function capacityKw(machine: Compressor, sstC: number, plan: Pick<CoverInput, 'group' | 'targetSstC'>): number {
  const speed = machine.driveHz === undefined ? 1 : machine.driveHz / machine.baseHz
  const fullKw = machine.ahri540 === undefined
    ? linearKw(machine, sstC, plan)
    : ahri540(machine.ahri540, sstC, machine.sctC ?? 0) / WATTS_PER_KW
  return Math.max(0, speed * fullKw)
}

function linearKw(machine: Compressor, sstC: number, plan: Pick<CoverInput, 'group' | 'targetSstC'>): number {
  const slope = machine.slopePerK ?? DEFAULT_SLOPE_PER_K[plan.group]
  return (machine.kw ?? 0) * (1 + slope * (sstC - plan.targetSstC))
}

/**
 * The polynomial of AHRI Standard 540 at suction S and condensing D:
 * C1 + C2·S + C3·D + C4·S² + C5·S·D + C6·D² + C7·S³ + C8·D·S² + C9·S·D² + C10·D³.
 */
export function ahri540(coefficients: readonly number[], suctionC: number, condensingC: number): number {
  const [s, d] = [suctionC, condensingC]
  const terms = [1, s, d, s * s, s * d, d * d, s ** 3, d * s * s, s * d * d, d ** 3]
  return terms.reduce((sum, term, index) => sum + term * coefficients[index]!, 0)
}

/** Load in kW at a saturated suction temperature in °C. */
export function loadKw(load: CoverLoad, sstC: number): number {
  return 'kw' in load ? load.kw : load.uaKwPerK * (load.airC - sstC)
}
