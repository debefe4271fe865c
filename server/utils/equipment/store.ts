import { and, count, eq, sql } from 'drizzle-orm'
import type { PgTable } from 'drizzle-orm/pg-core'
import type { z } from 'zod'
import { POINTS_MAX } from '../../../shared/schemas/equipment'
import { RESOURCE_SCHEMAS, RESOURCE_WORDS } from '../../../shared/schemas/site-view'
import type { ResourceItem, ResourceName, ResourceValue, SiteView } from '../../../shared/schemas/site-view'
import { cases, circuits, controllers, instruments, outages, points, racks, sites, suctionGroups } from '../../database/schema'
import type { Queries } from '../database'
import { useDatabase } from '../database'
import { differences } from '../changes/differences'
import type { Changer } from '../changes/keep'
import { keepChange } from '../changes/keep'
import { conflict, notFound, unprocessable } from '../errors'
import { CHECKS } from './checks'
import { placed } from './check-point'
import { refuseFault } from './fault'
import { viewSite } from './site-view'
import { toldValue } from './told'
import { usesOf } from './uses'

interface Resource {
  table: PgTable & { id: typeof controllers.id }
  list: keyof Pick<SiteView, 'controllers' | 'racks' | 'suctionGroups' | 'circuits' | 'cases' | 'points' | 'instruments'>
  /** The field that says where it belongs; it never moves. */
  parent: 'siteId' | 'controllerId' | 'rackId'
  /** As many as the snapshot of an outage carries. */
  most: number
}

/** One line a resource: a missing one is a compile error. */
const RESOURCES: Record<ResourceName, Resource> = {
  'controllers': { table: controllers as unknown as Resource['table'], list: 'controllers', parent: 'siteId', most: 50 },
  'racks': { table: racks as unknown as Resource['table'], list: 'racks', parent: 'controllerId', most: 50 },
  'suction-groups': { table: suctionGroups as unknown as Resource['table'], list: 'suctionGroups', parent: 'rackId', most: 100 },
  'circuits': { table: circuits as unknown as Resource['table'], list: 'circuits', parent: 'rackId', most: 400 },
  'cases': { table: cases as unknown as Resource['table'], list: 'cases', parent: 'controllerId', most: 400 },
  'points': { table: points as unknown as Resource['table'], list: 'points', parent: 'controllerId', most: POINTS_MAX },
  'instruments': { table: instruments as unknown as Resource['table'], list: 'instruments', parent: 'siteId', most: 100 },
}

/** Runs with the site locked, so that what was checked still holds when it is stored. */
export async function withSite<T>(siteId: string, act: (tx: Queries, site: SiteView) => Promise<T>): Promise<T> {
  return useDatabase().transaction(async (tx) => {
    const [row] = await tx.select().from(sites).where(eq(sites.id, siteId)).for('update')
    return row ? act(tx, await viewSite(tx, row)) : notFound('site')
  })
}

function itemOf<R extends ResourceName>(site: SiteView, resource: R, id: string): ResourceItem<R> {
  const items: { id: string }[] = site[RESOURCES[resource].list]
  return items.find(item => item.id === id) as ResourceItem<R> | undefined ?? notFound(RESOURCE_WORDS[resource].one)
}

function checked<R extends ResourceName>(resource: R, value: ResourceValue<R>, site: SiteView, self: string | null): ResourceValue<R> {
  const settled = resource === 'points' ? placed(value as ResourceValue<'points'>, site) as ResourceValue<R> : value
  // CHECKS holds the check of each resource under its own name; TypeScript cannot follow that through R.
  refuseFault((CHECKS[resource] as (value: ResourceValue<R>, site: SiteView, self: string | null) => ReturnType<(typeof CHECKS)['racks']>)(settled, site, self)[0])
  return settled
}

/** Adds to a site. 409: a name in use, or too many; 422: something it refers to is wrong. */
export async function createItem<R extends ResourceName>(siteId: string, by: Changer, resource: R, value: ResourceValue<R>): Promise<ResourceItem<R>> {
  const { table, list, parent, most } = RESOURCES[resource]
  return withSite(siteId, async (tx, site) => {
    const settled = checked(resource, value, site, null)
    const parentOf = (item: object) => (item as Record<string, unknown>)[parent]
    if (site[list].filter(item => parentOf(item) === parentOf(settled)).length >= most) return conflict(`At most ${most} ${RESOURCE_WORDS[resource].many}`)
    const [row] = await tx.insert(table).values({ ...settled, siteId }).returning({ id: table.id })
    await keepItem(tx, by, site, resource, row!.id, null, settled)
    return { ...settled, id: row!.id }
  })
}

/** Changes fields; what it belongs to stays. */
export async function updateItem<R extends ResourceName>(siteId: string, by: Changer, resource: R, id: string, change: Partial<ResourceValue<R>>): Promise<ResourceItem<R>> {
  const { table, parent } = RESOURCES[resource]
  return withSite(siteId, async (tx, site) => {
    const before = itemOf(site, resource, id)
    const given = Object.fromEntries(Object.entries(change).filter(([, value]) => value !== undefined))
    const moved = given[parent] !== undefined && given[parent] !== (before as Record<string, unknown>)[parent]
    if (moved) return unprocessable(parent, `A ${RESOURCE_WORDS[resource].one} stays where it is; make a new one there`)
    const settled = checked(resource, RESOURCE_SCHEMAS[resource].parse({ ...before, ...given }) as ResourceValue<R>, site, id)
    await tx.update(table).set(settled).where(eq(table.id, id))
    if (resource === 'points') await renameDriven(tx, before as ResourceItem<'points'>, settled as ResourceValue<'points'>)
    await keepItem(tx, by, site, resource, id, before, settled)
    return { ...settled, id }
  })
}

/** Drives name what they drive by its tag, so they follow when it changes. */
async function renameDriven(tx: Queries, before: ResourceItem<'points'>, after: ResourceValue<'points'>): Promise<void> {
  if (before.tag === after.tag) return
  await tx.update(points).set({ drives: after.tag }).where(and(eq(points.controllerId, before.controllerId), eq(points.drives, before.tag)))
}

/** Deletes what nothing uses; else 409 with what does. */
export async function deleteItem(siteId: string, by: Changer, resource: ResourceName, id: string): Promise<void> {
  const { table } = RESOURCES[resource]
  await withSite(siteId, async (tx, site) => {
    const before = itemOf(site, resource, id)
    const [row] = await tx.select({ size: count() }).from(outages).where(eq(outages.controllerId, sql`${id}`))
    const uses = usesOf(resource, id, site, () => row?.size ?? 0)
    if (uses.length > 0) return conflict(`In use by ${sentence(uses)}`)
    await tx.delete(table).where(eq(table.id, id))
    await keepItem(tx, by, site, resource, id, before, null)
  })
}

/** Writes who did what to a thing of a site. @param before null: it was added @param after null: it was deleted */
async function keepItem(tx: Queries, by: Changer, site: SiteView, resource: ResourceName, id: string, before: object | null, after: object | null): Promise<void> {
  const { name, tag } = (after ?? before) as { name: string, tag?: string }
  await keepChange(tx, by, {
    subject: resource, subjectId: id, subjectName: tag ? `${tag} ${name}` : name, siteId: site.id,
    deed: before === null ? 'added' : after === null ? 'deleted' : 'changed',
    fields: differences(before ? toldValue(before, site) : {}, after ? toldValue(after, site) : {}),
  })
}

function sentence(parts: string[]): string {
  return parts.length < 2 ? parts.join('') : `${parts.slice(0, -1).join(', ')} and ${parts.at(-1)}`
}

/** The schema of a resource's new value, and of a change to it. */
export function schemaOf<R extends ResourceName>(resource: R): { whole: z.ZodType<ResourceValue<R>, z.ZodTypeDef, unknown>, change: z.ZodType<Partial<ResourceValue<R>>, z.ZodTypeDef, unknown> } {
  const schema = RESOURCE_SCHEMAS[resource]
  return { whole: schema as never, change: schema.partial() as never }
}
