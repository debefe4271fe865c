import type { H3Event } from 'h3'
import { z } from 'zod'
import { eq } from 'drizzle-orm'
import { RESOURCE_NAMES } from '../../../shared/schemas/site-view'
import type { ResourceName } from '../../../shared/schemas/site-view'
import { controllers } from '../../database/schema'
import type { sites } from '../../database/schema'
import { maySeeSite, requirePerson, requireSite } from '../access'
import type { Person } from '../access'
import { useDatabase } from '../database'
import { forbidden, notFound } from '../errors'
import { readParamsAs } from '../parse'

const siteParams = z.object({ siteId: z.string().uuid() })
const resourceParams = siteParams.extend({ resource: z.enum(RESOURCE_NAMES) })
const itemParams = resourceParams.extend({ id: z.string().uuid() })
const controllerParams = z.object({ id: z.string().uuid() })

/** Equipment and kinds of work are an administrator's to change; the reason says so. */
export function requireEditor(person: Person): void {
  if (person.role !== 'administrator') forbidden('Only an administrator changes equipment')
}

/** The site that a route names, if the person may see it; else 404. */
export async function siteOf(event: H3Event): Promise<typeof sites.$inferSelect> {
  const person = requirePerson(event)
  return requireSite(person, readParamsAs(event, siteParams, 'site').siteId)
}

/** The site that a route names, for somebody who may change it: 404 where it is not theirs to see, else 403. */
export async function editableSite(event: H3Event): Promise<typeof sites.$inferSelect> {
  const site = await siteOf(event)
  requireEditor(requirePerson(event))
  return site
}

/** The list of equipment that a route names, for somebody who may change it. */
export async function editableResource(event: H3Event): Promise<{ siteId: string, resource: ResourceName }> {
  const site = await editableSite(event)
  return { siteId: site.id, resource: readParamsAs(event, resourceParams, 'list of equipment').resource }
}

/** One thing of a site's equipment, for somebody who may change it. */
export async function editableItem(event: H3Event): Promise<{ siteId: string, resource: ResourceName, id: string }> {
  const { siteId } = await editableResource(event)
  const { resource, id } = readParamsAs(event, itemParams, 'thing')
  return { siteId, resource, id }
}

/** The controller that a route names, for somebody who may change it. */
export async function editableController(event: H3Event): Promise<{ siteId: string, controllerId: string }> {
  const person = requirePerson(event)
  const { id } = readParamsAs(event, controllerParams, 'controller')
  const [row] = await useDatabase().select({ siteId: controllers.siteId }).from(controllers).where(eq(controllers.id, id))
  if (!row || !await maySeeSite(person, row.siteId)) return notFound('controller')
  requireEditor(person)
  return { siteId: row.siteId, controllerId: id }
}
