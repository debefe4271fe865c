import type { FoodComposition, FoodId } from '~~/shared/schemas/hold'

/**
 * Composition by mass in % and the temperature at which freezing begins, °C.
 * Source: ASHRAE Handbook, Refrigeration, ch. 19, table 3 (peas compared with
 * the table; the others written from memory of it).
 */
export const FOODS: Readonly<Record<FoodId, FoodComposition>> = {
  'peas': { water: 78.86, protein: 5.42, fat: 0.40, carbohydrate: 14.46, ash: 0.86, freezingC: -0.6 },
  'beef': { water: 58.21, protein: 17.48, fat: 22.55, carbohydrate: 0, ash: 0.82, freezingC: -1.7 },
  'chicken': { water: 65.99, protein: 18.60, fat: 15.06, carbohydrate: 0, ash: 0.79, freezingC: -2.8 },
  'cod': { water: 81.22, protein: 17.81, fat: 0.67, carbohydrate: 0, ash: 1.16, freezingC: -2.2 },
  'ice-cream': { water: 61.00, protein: 3.50, fat: 11.00, carbohydrate: 23.60, ash: 0.90, freezingC: -5.6 },
}

/** The composition of a food given by name or by its own figures. */
export function compositionOf(food: FoodId | FoodComposition): FoodComposition {
  return typeof food === 'string' ? FOODS[food] : food
}
