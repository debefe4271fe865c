/** What the holding engine offers; the same code runs on the server and in the browser. */
export { assess } from './judge'
export { parseAssessInput } from './parse'
export type { ParsedAssessInput } from './parse'
export { classById, limitFor, rulebookById, rulebooks } from './rulebooks'
export { longestMinutes, siteFault } from './resolve'
export { convertTemperature } from './units'
export type { Assessment, Authority, EffectiveClass, FoodClass, Limit, Notice, Rule, Rulebook, SourceMark, Verdict } from './types'
