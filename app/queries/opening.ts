import type { Snapshot } from '~~/shared/record/snapshot'
import type { StepPlan } from '~~/shared/schemas/work'

export interface ControllerItem { id: string, name: string, place: string, site: { id: string, code: string, name: string, timeZone: string } }
export interface WorkKindItem { id: string, name: string, steps: StepPlan[], rollBack: StepPlan[] }

/** What an outage can be opened of, and for which work. */
export const fetchControllers = () => $fetch<ControllerItem[]>('/api/controllers')
export const fetchWorkKinds = () => $fetch<WorkKindItem[]>('/api/work-kinds')
export const fetchSnapshot = (controller: string) => $fetch<Snapshot>(`/api/controllers/${controller}/snapshot`)
