export { planOrder, type OrderStep, type PlannedOrder } from './plan'
export { parseOrderInput } from './parse'
export { proposeHand, type ProposalContext, type ProposablePoint } from './propose'
export type { OrderRule, Refusal } from './refusals'
