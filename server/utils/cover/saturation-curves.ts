import type { RefrigerantId } from '~~/shared/schemas/refrigerants'

/**
 * One saturation curve: ln(p / reducingKpa) = (reducingK / T)·Σ factorᵢ·θ^powerᵢ
 * with θ = 1 − T/reducingK and T in K.
 */
export interface SaturationCurve {
  reducingK: number
  reducingKpa: number
  factors: readonly number[]
  powers: readonly number[]
}

/** Curves of one refrigerant with the temperatures between which they are used, °C. */
export interface RefrigerantCurves {
  /** `pure` has one curve for both; `blend` boils over a glide between bubble and dew. */
  nature: 'pure' | 'blend'
  bubble: SaturationCurve
  dew: SaturationCurve
  lowestC: number
  highestC: number
  /** Why there is nothing beyond either end, as the end of a sentence that begins with the name. */
  below: string
  above: string
}

const ZERO_C_IN_K = 273.15

function pure(reducingK: number, reducingKpa: number, lowestC: number, factors: readonly number[], powers: readonly number[]): RefrigerantCurves {
  const curve = { reducingK, reducingKpa, factors, powers }
  return withEnds('pure', curve, curve, lowestC)
}

/** A blend given by the published curves of a pseudo-pure fluid, which begin at 200 K. */
function pseudoPure(reducingK: number, reducingKpa: number, bubble: [number[], number[]], dew: [number[], number[]]): RefrigerantCurves {
  const curve = ([factors, powers]: [number[], number[]]) => ({ reducingK, reducingKpa, factors, powers })
  return withEnds('blend', curve(bubble), curve(dew), 200 - ZERO_C_IN_K)
}

/** Used from `lowestC` up to the reducing temperature, which is the critical one for these fluids. */
function withEnds(nature: RefrigerantCurves['nature'], bubble: SaturationCurve, dew: SaturationCurve, lowestC: number): RefrigerantCurves {
  const highestC = bubble.reducingK - ZERO_C_IN_K
  return {
    nature, bubble, dew, lowestC, highestC,
    below: `has no saturation here below ${lowestC.toFixed(2)} °C`,
    above: `has no saturation above ${highestC.toFixed(2)} °C`,
  }
}

const FITTED_POWERS = [1, 1.5, 2.5, 5] as const
const FITTED_C = [-50, 60] as const

/** A blend whose curves we fitted to the mixture equations between −50 and 60 °C, within 0.31 %. */
function fittedBlend(reducingK: number, reducingKpa: number, bubble: readonly number[], dew: readonly number[]): RefrigerantCurves {
  const curve = (factors: readonly number[]) => ({ reducingK, reducingKpa, factors, powers: FITTED_POWERS })
  const beyond = `is known only from ${FITTED_C[0]} to ${FITTED_C[1]} °C`
  return {
    nature: 'blend', bubble: curve(bubble), dew: curve(dew),
    lowestC: FITTED_C[0], highestC: FITTED_C[1], below: beyond, above: beyond,
  }
}

/**
 * Sources: the vapour-pressure equations published with the reference equations
 * of state of R-134a, R-22, R-744 and R-290 (within 0.02 % of them from −50 to
 * 50 °C) and the published pseudo-pure curves of R-404A and R-507A. R-448A,
 * R-449A and R-407A are our own fits to the mixture equations. The low ends of
 * the pure fluids are their triple points.
 */
export const SATURATION_CURVES: Readonly<Record<RefrigerantId, RefrigerantCurves>> = {
  'R-134a': pure(374.21, 4059.28, -103.3,
    [0.4331478287, -9.0903025591, 2.1476074125, -1.5576870076, -3.5020328973, 14.9584423372],
    [0.845, 0.99, 1.14, 2.651, 4.507, 17.235]),
  'R-22': pure(369.295, 4990, -157.42,
    [-7.2670371702, 1.2860929616, -0.1079011980, -0.9894732917, -2.9393096356, 0.4884319173],
    [0.999, 1.272, 1.692, 2.74, 4.539, 15.876]),
  'R-744': pure(304.1282, 7377.3, -56.56,
    [-5.8673993376, -7.1096955002, 11.0227819862, 4.8260764050, -6.2408033826, -6.7009642572],
    [0.983, 1.322, 1.488, 2.807, 3.571, 1.941]),
  'R-290': pure(369.89, 4251.2, -187.62,
    [-23.9986357474, 18.3130176052, -0.4224085197, -2.7378298814, 0.2578884142, -1.3113462226],
    [1.05, 1.084, 2.259, 4.287, 7.66, 18.584]),
  'R-404A': pseudoPure(345.27, 3734.8,
    [[0.061067, -6.5646, -3.6162, -3.9771], [0.54, 0.965, 3.7, 9]],
    [[-0.00026863, -6.5757, -4.1802, -7.9102], [0.1, 0.972, 3.8, 9]]),
  'R-507A': pseudoPure(343.765, 3704.9,
    [[-7.4853, 2.0115, -2.0141, -3.7763], [1, 1.5, 2.2, 4.6]],
    [[-7.5459, 2.338, -2.237, -4.1535], [1, 1.5, 2.1, 4.7]]),
  'R-448A': fittedBlend(355.83, 4600,
    [-6.392879, -0.501246, 0.457622, -7.310905], [-8.910196, 4.859891, -6.250815, 2.737967]),
  'R-449A': fittedBlend(354.65, 4447,
    [-6.449301, -0.417037, 0.335512, -7.255998], [-8.899647, 4.900842, -6.430268, 3.361367]),
  'R-407A': fittedBlend(355.41, 4515,
    [-6.578314, -0.256619, 0.208410, -7.241766], [-8.672116, 4.093747, -5.534489, 0.921929]),
}
