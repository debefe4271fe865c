import { and, eq, inArray } from 'drizzle-orm'
import type { CountedOutage, StepOffer, TimesAccepted } from '../../../shared/schemas/insights'
import { outageFacts, outages, stepLessons, workKinds } from '../../database/schema'
import type { Person } from '../access'
import { visibleSites } from '../access'
import type { Database, Queries } from '../database'
import { conflict, notFound } from '../errors'
import { acceptStep } from '../learn/lessons'
import type { PendingStep } from './offer'
import { correctionsOf, offersFor } from './offer'

/**
 * What sealed outages offer to correct, by kind of work; lessons that were accepted already count for nothing again.
 * @param counted the newest first
 */
export async function readOffers(db: Queries, counted: readonly CountedOutage[]): Promise<Record<string, StepOffer[]>> {
  const sealed = counted.filter(outage => outage.sealed).reverse()
  const ids = [...new Set(sealed.flatMap(({ facts }) => facts.work.kindId ?? []))]
  if (ids.length === 0) return {}
  const kinds = await db.select().from(workKinds).where(inArray(workKinds.id, ids))
  const known = await acceptedSteps(db, ids)
  return Object.fromEntries(kinds.flatMap((kind) => {
    const own = sealed.filter(({ facts }) => facts.work.kindId === kind.id)
    const offers = offersFor(kind, known.seenOf(kind.id), own.flatMap(outage => pendingOf(outage, kind.id, known.has)))
    return offers.length > 0 ? [[kind.id, offers] as const] : []
  }))
}

interface AcceptedSteps {
  has: (kindId: string, step: string, outageId: string) => boolean
  /** outages from which the times of each step come already */
  seenOf: (kindId: string) => Map<string, number>
}

async function acceptedSteps(db: Queries, kindIds: string[]): Promise<AcceptedSteps> {
  const rows = await db.select({ kindId: stepLessons.workKindId, step: stepLessons.step, outageId: stepLessons.outageId }).from(stepLessons).where(inArray(stepLessons.workKindId, kindIds))
  const known = new Set(rows.map(row => `${row.kindId} ${row.step} ${row.outageId}`))
  return {
    has: (kindId, step, outageId) => known.has(`${kindId} ${step} ${outageId}`),
    seenOf: (kindId) => {
      const seen = new Map<string, number>()
      for (const row of rows) if (row.kindId === kindId) seen.set(row.step, (seen.get(row.step) ?? 0) + 1)
      return seen
    },
  }
}

function pendingOf({ id, code, facts }: Pick<CountedOutage, 'id' | 'code' | 'facts'>, kindId: string, isAccepted: AcceptedSteps['has']): PendingStep[] {
  return facts.steps.filter(({ step }) => !isAccepted(kindId, step, id)).map(({ step, minutes }) => ({ step, minutes, outage: { id, code } }))
}

/**
 * Takes corrections over into a kind of work, one outage after another, each with its line in the history.
 * 404: no such kind of work, or an outage that is not the person's to see; 409: it would no longer become what was shown.
 */
export async function acceptTimes(db: Database, person: Person, { workKindId, steps }: TimesAccepted, now: number): Promise<void> {
  await db.transaction(async (tx) => {
    const [kind] = await tx.select().from(workKinds).where(eq(workKinds.id, workKindId)).for('update')
    if (!kind) return notFound('kind of work')
    const sealed = await readSealed(tx, person, steps.flatMap(item => item.outages))
    const known = await acceptedSteps(tx, [workKindId])
    const seen = known.seenOf(workKindId)
    for (const { step, proposed, outages: from } of steps) {
      const plan = [...kind.steps, ...kind.rollBack].find(item => item.id === step)
      const pending = sealed.filter(outage => from.includes(outage.id) && outage.facts.work.kindId === workKindId).flatMap(outage => pendingOf(outage, workKindId, known.has))
      const corrections = plan ? correctionsOf(plan, seen.get(step) ?? 0, pending) : []
      const after = corrections.at(-1)?.after
      if (!after || after.shortest !== proposed.shortest || after.likely !== proposed.likely || after.longest !== proposed.longest) conflict('These times have changed since they were shown; look at them again', 'steps')
      for (const { outage, minutes, before, after } of corrections) {
        await acceptStep(tx, person, { outageId: outage.id, outageCode: outage.code, acceptedBy: person.id, acceptedName: person.name, acceptedAt: new Date(now), workKindId, step, minutes, before, after }, now)
      }
    }
  })
}

/** Sealed outages of these ids, the oldest first. 404 where one is not there or not the person's to see. */
async function readSealed(db: Queries, person: Person, ids: readonly string[]) {
  const wanted = [...new Set(ids)]
  const visible = await visibleSites(person, db)
  const rows = await db.select({ id: outages.id, code: outages.code, facts: outageFacts.facts }).from(outages).innerJoin(outageFacts, eq(outageFacts.outageId, outages.id))
    .where(and(inArray(outages.id, wanted), eq(outages.phase, 'sealed'), visible ? inArray(outages.siteId, visible) : undefined)).orderBy(outages.openedAt, outages.id)
  return rows.length === wanted.length ? rows : notFound('sealed outage')
}
