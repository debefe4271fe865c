import type { z } from 'zod'
import type { caseSchema, circuitSchema, controllerSchema, instrumentSchema, pointSchema, rackSchema, siteSchema, suctionGroupSchema } from '../../../shared/schemas/equipment'
import type { workKindSchema } from '../../../shared/schemas/work'

/** A site written down by names, as people speak of its equipment; ids come when it is stored. */
export interface SiteSeed {
  site: z.input<typeof siteSchema>
  controllers: ControllerSeed[]
  /** `checkedDaysAgo`: days before the seed at which it was last checked */
  instruments: (Omit<z.input<typeof instrumentSchema>, 'lastCheckOn'> & { checkedDaysAgo: number })[]
}

export interface ControllerSeed {
  controller: z.input<typeof controllerSchema>
  racks: RackSeed[]
  cases: (Omit<z.input<typeof caseSchema>, 'controllerId' | 'circuitId'> & { circuit: string | null })[]
  points: PointSeed[]
}

export interface RackSeed {
  rack: Omit<z.input<typeof rackSchema>, 'controllerId'>
  suctionGroups: Omit<z.input<typeof suctionGroupSchema>, 'rackId'>[]
  circuits: (Omit<z.input<typeof circuitSchema>, 'rackId' | 'suctionGroupId'> & { suctionGroup: string })[]
}

export type PointSeed = Omit<z.input<typeof pointSchema>, 'controllerId' | 'rackId' | 'suctionGroupId' | 'circuitId' | 'caseIds'>
  & { rack?: string, suctionGroup?: string, circuit?: string, cases?: string[] }

export type WorkKindSeed = z.input<typeof workKindSchema>
