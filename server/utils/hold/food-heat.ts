import type { FoodComposition } from '~~/shared/schemas/hold'

/** Chen counts enthalpy from this temperature, °C. */
export const REFERENCE_C = -40
/** Latent heat of fusion of water, kJ/kg. */
const FUSION_KJ_PER_KG = 333.6

/**
 * Chen's constants for one food. Below freezing
 * H(T) = (T − tr)·(solid − melt / T) and dH/dT = solid + |tr|·melt / T²;
 * above it dH/dT = thawed. kJ/kg and °C.
 */
export interface ChenHeat {
  freezingC: number
  solid: number
  melt: number
  thawed: number
}

/**
 * Chen's enthalpy constants from a composition in %.
 * Source: Chen (1985) in ASHRAE Handbook, Refrigeration, ch. 19.
 */
export function chenHeat(food: FoodComposition): ChenHeat {
  const water = food.water / 100
  const solids = 1 - water
  const boundWater = 0.4 * food.protein / 100
  return {
    freezingC: food.freezingC,
    solid: 1.55 + 1.26 * solids,
    melt: (water - boundWater) * FUSION_KJ_PER_KG * food.freezingC / REFERENCE_C,
    thawed: 4.19 - 2.30 * solids - 0.628 * solids ** 3,
  }
}

/**
 * Enthalpy of a food in kJ/kg above its value at −40 °C, at `celsius`.
 * Throws a RangeError below −40 °C, where Chen's formula says nothing.
 * Source: Chen (1985) in ASHRAE Handbook, Refrigeration, ch. 19.
 */
export function enthalpyKjPerKg(food: FoodComposition, celsius: number): number {
  if (celsius < REFERENCE_C) {
    throw new RangeError(`enthalpy of food is not known below ${REFERENCE_C} °C`)
  }
  const heat = chenHeat(food)
  const frozen = (c: number) => (c - REFERENCE_C) * (heat.solid - heat.melt / c)
  return celsius <= heat.freezingC
    ? frozen(celsius)
    : frozen(heat.freezingC) + (celsius - heat.freezingC) * heat.thawed
}

/**
 * Mass fraction of ice in a food at `celsius` (0 at or above its freezing
 * point), from its water (mass fraction, before freezing).
 * Source: Tchigeov (1979) in ASHRAE Handbook, Refrigeration, ch. 19.
 */
export function iceFraction(water: number, freezingC: number, celsius: number): number {
  return celsius >= freezingC
    ? 0
    : 1.105 * water / (1 + 0.7138 / Math.log(freezingC - celsius + 1))
}

/** Parts of an unfrozen food by mass fraction; absent parts count as none. */
export interface FoodParts {
  water: number
  protein?: number
  fat?: number
  carbohydrate?: number
  fibre?: number
  ash?: number
}

/** Choi and Okos: specific heat of each part as a + b·t + c·t², kJ/(kg·K), t in °C ≥ 0. */
const CHOI_OKOS: Readonly<Record<keyof FoodParts, readonly [number, number, number]>> = {
  water: [4.1762, -9.0864e-5, 5.4731e-6],
  protein: [2.0082, 1.2089e-3, -1.3129e-6],
  fat: [1.9842, 1.4733e-3, -4.8008e-6],
  carbohydrate: [1.5488, 1.9625e-3, -5.9399e-6],
  fibre: [1.8459, 1.8306e-3, -4.6509e-6],
  ash: [1.0926, 1.8896e-3, -3.6817e-6],
}

/**
 * Specific heat of an unfrozen food, kJ/(kg·K), at `celsius` ≥ 0.
 * Source: Choi and Okos (1986) in ASHRAE Handbook, Refrigeration, ch. 19.
 */
export function unfrozenSpecificHeat(parts: FoodParts, celsius: number): number {
  return (Object.keys(CHOI_OKOS) as (keyof FoodParts)[]).reduce((sum, part) => {
    const [a, b, c] = CHOI_OKOS[part]
    return sum + (parts[part] ?? 0) * (a + b * celsius + c * celsius ** 2)
  }, 0)
}
