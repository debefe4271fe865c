export { normalWithin, planDuration, type Chance, type PlannedDuration } from './plan'
export { parseDurationInput } from './parse'
