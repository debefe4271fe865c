import type { z } from 'zod'
import type { SettingMark } from './changes'
import { caseSchema, circuitSchema, controllerSchema, instrumentSchema, pointSchema, rackSchema, suctionGroupSchema } from './equipment'
import type { SiteLimits, siteSchema } from './equipment'
import type { workKindSchema } from './work'

/** The lists of a site's equipment, as routes name them. */
export const RESOURCE_NAMES = ['controllers', 'racks', 'suction-groups', 'circuits', 'cases', 'points', 'instruments'] as const
export type ResourceName = (typeof RESOURCE_NAMES)[number]

export const RESOURCE_SCHEMAS = {
  'controllers': controllerSchema,
  'racks': rackSchema,
  'suction-groups': suctionGroupSchema,
  'circuits': circuitSchema,
  'cases': caseSchema,
  'points': pointSchema,
  'instruments': instrumentSchema,
} as const satisfies Record<ResourceName, z.AnyZodObject>

export type ResourceValue<R extends ResourceName = ResourceName> = z.output<(typeof RESOURCE_SCHEMAS)[R]>
export type ResourceItem<R extends ResourceName = ResourceName> = ResourceValue<R> & { id: string }

/** What people call one thing of a list, within a sentence. */
export const RESOURCE_WORDS: Record<ResourceName, { one: string, many: string }> = {
  'controllers': { one: 'controller', many: 'controllers' },
  'racks': { one: 'rack', many: 'racks' },
  'suction-groups': { one: 'suction group', many: 'suction groups' },
  'circuits': { one: 'circuit', many: 'circuits' },
  'cases': { one: 'case', many: 'cases' },
  'points': { one: 'point', many: 'points' },
  'instruments': { one: 'instrument', many: 'instruments' },
}

export type SiteValue = z.output<typeof siteSchema>
export type SiteItem = SiteValue & { id: string }
/** A line of the list of sites. */
export interface SiteLine { id: string, code: string, name: string, address: string, timeZone: string, rulebook: string, controllers: number, cases: number, points: number }

/** A site with all its equipment, each list by name. */
export interface SiteView extends SiteItem, SiteLimits {
  controllers: ResourceItem<'controllers'>[]
  racks: ResourceItem<'racks'>[]
  suctionGroups: ResourceItem<'suction-groups'>[]
  circuits: ResourceItem<'circuits'>[]
  cases: ResourceItem<'cases'>[]
  points: ResourceItem<'points'>[]
  instruments: ResourceItem<'instruments'>[]
}

/** A site under the rulebook that judges its product, with who set each of its stricter settings. */
export interface BookSite extends SiteLimits { id: string, code: string, name: string, timeZone: string, set: Record<string, SettingMark> }

export type WorkKindValue = z.output<typeof workKindSchema>
export type WorkKindItem = WorkKindValue & { id: string }
