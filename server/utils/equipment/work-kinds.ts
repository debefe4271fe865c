import { and, asc, eq, ne, sql } from 'drizzle-orm'
import type { WorkKindItem, WorkKindValue } from '../../../shared/schemas/site-view'
import { workKindSchema } from '../../../shared/schemas/work'
import { workKinds } from '../../database/schema'
import { differences } from '../changes/differences'
import type { Changer } from '../changes/keep'
import { keepChange } from '../changes/keep'
import type { Queries } from '../database'
import { useDatabase } from '../database'
import { conflict, notFound, unprocessable } from '../errors'
import { parseDurationInput } from '../duration'
import { isTaken } from './taken'

const columns = { id: workKinds.id, name: workKinds.name, steps: workKinds.steps, rollBack: workKinds.rollBack }
const nameTaken = (): never => conflict('Another kind of work has this name', 'name')

/** All kinds of work, by name. */
export async function listWorkKinds(): Promise<WorkKindItem[]> {
  return useDatabase().select(columns).from(workKinds).orderBy(asc(workKinds.name), asc(workKinds.id))
}

export async function createWorkKind(by: Changer, value: WorkKindValue): Promise<WorkKindItem> {
  refuseRings(value)
  return unlessTaken(useDatabase().transaction(async (tx) => {
    await refuseName(tx, value.name, null)
    const [row] = await tx.insert(workKinds).values(value).returning(columns)
    await keepKind(tx, by, row!.id, null, value)
    return row!
  }))
}

export async function updateWorkKind(id: string, by: Changer, change: Partial<WorkKindValue>): Promise<WorkKindItem> {
  return unlessTaken(useDatabase().transaction(async (tx) => {
    const [before] = await tx.select(columns).from(workKinds).where(eq(workKinds.id, id)).for('update')
    if (!before) return notFound('kind of work')
    const given = Object.fromEntries(Object.entries(change).filter(([, value]) => value !== undefined))
    const value = workKindSchema.parse({ ...before, ...given })
    refuseRings(value)
    await refuseName(tx, value.name, id)
    await tx.update(workKinds).set(value).where(eq(workKinds.id, id))
    await keepKind(tx, by, id, workKindSchema.parse(before), value)
    return { ...value, id }
  }))
}

/** Plans carry the steps themselves, so a kind of work can go at any time. */
export async function deleteWorkKind(id: string, by: Changer): Promise<void> {
  await useDatabase().transaction(async (tx) => {
    const [gone] = await tx.delete(workKinds).where(eq(workKinds.id, id)).returning(columns)
    if (!gone) return notFound('kind of work')
    await keepKind(tx, by, id, workKindSchema.parse(gone), null)
  })
}

/** Writes who did what to a kind of work. @param before null: it was added @param after null: it was deleted */
async function keepKind(tx: Queries, by: Changer, id: string, before: WorkKindValue | null, after: WorkKindValue | null): Promise<void> {
  await keepChange(tx, by, {
    subject: 'work-kind', subjectId: id, subjectName: (after ?? before)!.name, siteId: null,
    deed: before === null ? 'added' : after === null ? 'deleted' : 'changed', fields: differences({ ...before }, { ...after }),
  })
}

/** 422 where steps wait for each other. */
function refuseRings({ steps, rollBack }: WorkKindValue): void {
  for (const [field, list] of [['steps', steps], ['rollBack', rollBack]] as const) {
    if (list.length === 0) continue
    const parsed = parseDurationInput({ steps: list.map(({ id, shortest, likely, longest, after }) => ({ id, shortest, likely, longest, after })) })
    if (!parsed.ok) unprocessable(field, parsed.reason)
  }
}

async function refuseName(tx: Queries, name: string, self: string | null): Promise<void> {
  const sameName = sql`lower(${workKinds.name}) = lower(${name})`
  const [other] = await tx.select({ id: workKinds.id }).from(workKinds).where(self === null ? sameName : and(sameName, ne(workKinds.id, self)))
  if (other) nameTaken()
}

async function unlessTaken<T>(act: Promise<T>): Promise<T> {
  try {
    return await act
  } catch (error) {
    return isTaken(error) ? nameTaken() : Promise.reject(error)
  }
}
