export { planWindow, type DefrostConflict, type PlannedWindow, type WindowStart } from './plan'
export { parseWindowInput } from './parse'
