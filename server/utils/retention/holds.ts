import { and, desc, eq, isNull } from 'drizzle-orm'
import type { z } from 'zod'
import { retentionOver } from '../../../shared/record/retention'
import { uuidv7 } from '../../../shared/record/uuid'
import type { HoldItem, RecordRetention, holdSchema } from '../../../shared/schemas/retention'
import { files, legalHolds, outages } from '../../database/schema'
import type { Changer } from '../changes/keep'
import { keepChange } from '../changes/keep'
import type { Database, Queries } from '../database'
import { conflict, notFound } from '../errors'
import type { OutageRow } from '../record/log'
import { siteYears } from './settings'

/** Phases after which nothing more is done in an outage. */
export const ENDED = ['sealed', 'called-off'] as const

/** Whether a record has ended, so that its retention runs. */
export function hasEnded(phase: OutageRow['phase']): boolean {
  return ENDED.some(ended => ended === phase)
}

/** Legal holds of a record, the latest first. */
export async function holdsOf(db: Queries, outageId: string): Promise<HoldItem[]> {
  const rows = await db.select().from(legalHolds).where(eq(legalHolds.outageId, outageId)).orderBy(desc(legalHolds.id))
  return rows.map(row => ({
    id: row.id, by: row.personName, at: row.at.toISOString(), reason: row.reason,
    lifted: row.liftedAt === null ? null : { by: row.liftedByName ?? '', at: row.liftedAt.toISOString(), reason: row.liftedReason ?? '' },
  }))
}

/** How a record stands to its retention: when it is over, and whether it is under hold. */
export async function recordRetention(db: Queries, outage: OutageRow): Promise<RecordRetention> {
  const [years, holds, held] = await Promise.all([siteYears(db, outage.siteId), holdsOf(db, outage.id), db.$count(files, eq(files.outageId, outage.id))])
  const ended = hasEnded(outage.phase)
  // A row is written with each entry, so that it was written last when the last one was received.
  const over = ended ? new Date(retentionOver(outage.updatedAt.getTime(), years)).toISOString() : null
  return { years, ended, over, held: holds.some(hold => hold.lifted === null), holds, files: held }
}

/**
 * Puts a record under legal hold, or lifts the hold; who, when and why stay in the history.
 * 409: it is under hold already, or under none.
 * @param now Unix ms
 */
export async function setHold(db: Database, by: Changer, outage: OutageRow, { held, reason }: z.output<typeof holdSchema>, now: number): Promise<RecordRetention> {
  return db.transaction(async (tx) => {
    // The same lock that a deletion takes: of the two, whichever comes second sees the first.
    const [row] = await tx.select().from(outages).where(eq(outages.id, outage.id)).for('update')
    if (!row) return notFound('outage')
    const open = and(eq(legalHolds.outageId, row.id), isNull(legalHolds.liftedAt))
    const [standing] = await tx.select().from(legalHolds).where(open)
    if (held && standing) return conflict('This record is under legal hold already')
    if (!held && !standing) return conflict('This record is under no legal hold')
    if (held) await tx.insert(legalHolds).values({ id: uuidv7(now), outageId: row.id, personId: by.id, personName: by.name, at: new Date(now), reason })
    else await tx.update(legalHolds).set({ liftedById: by.id, liftedByName: by.name, liftedAt: new Date(now), liftedReason: reason }).where(open)
    const fields = held
      ? [{ field: 'legalHold', before: null, after: reason }]
      : [{ field: 'legalHold', before: standing!.reason, after: null }, { field: 'liftedReason', before: null, after: reason }]
    await keepChange(tx, by, { subject: 'record', subjectId: row.id, subjectName: row.code, siteId: row.siteId, deed: 'changed', fields }, now)
    return recordRetention(tx, row)
  })
}
