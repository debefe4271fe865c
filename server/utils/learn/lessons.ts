import { and, eq, inArray } from 'drizzle-orm'
import type { StepPlan } from '../../../shared/schemas/work'
import type { CaseLesson, Lessons, LessonsAccepted, StepLesson } from '../../../shared/schemas/lessons'
import { caseLessons, cases, stepLessons, workKinds } from '../../database/schema'
import type { Person } from '../access'
import type { Database, Queries } from '../database'
import { conflict, unprocessable } from '../errors'
import { keepChange } from '../changes/keep'
import type { OutageRow } from '../record/log'
import { readRecord } from '../record/paper'
import { casesTaught, combinedTau, correctedTimes, stepsTaught } from './from-record'

/** What an outage teaches, and what of it was accepted. Nothing before the seal: until then its readings may still be put right. */
export async function lessonsOf(db: Queries, outage: OutageRow): Promise<Lessons> {
  const { state, entries } = await readRecord(db, outage)
  const { workKind } = state.plan
  if (state.phase !== 'sealed') return { workKind, cases: [], steps: [] }
  const accepted = await db.select().from(caseLessons).where(eq(caseLessons.outageId, outage.id))
  const here = new Set((await db.select({ id: cases.id }).from(cases).where(eq(cases.controllerId, outage.controllerId))).map(item => item.id))
  return {
    workKind,
    cases: casesTaught(state, entries).map((lesson): CaseLesson => ({
      ...lesson,
      ...(here.has(lesson.caseId) ? {} : { tauHours: null, not: 'the case is no longer there' }),
      accepted: acceptance(accepted.find(item => item.caseId === lesson.caseId)),
    })),
    steps: workKind.id === null ? [] : await stepsOf(db, outage, workKind.id, stepsTaught(state)),
  }
}

async function stepsOf(db: Queries, outage: OutageRow, workKindId: string, taught: ReturnType<typeof stepsTaught>): Promise<StepLesson[]> {
  const [kind] = await db.select().from(workKinds).where(eq(workKinds.id, workKindId))
  const known = await db.select().from(stepLessons).where(eq(stepLessons.workKindId, workKindId))
  return taught.flatMap((lesson): StepLesson[] => {
    const own = known.find(item => item.step === lesson.step && item.outageId === outage.id)
    if (own) return [{ ...lesson, was: own.before, proposed: own.after, not: null, accepted: acceptance(own) }]
    const step = kind && [...kind.steps, ...kind.rollBack].find(item => item.id === lesson.step)
    if (!step) return []
    const was = timesOf(step)
    return [{ ...lesson, was, proposed: correctedTimes(was, lesson.minutes, known.filter(item => item.step === lesson.step).length), not: null, accepted: null }]
  })
}

const timesOf = ({ shortest, likely, longest }: StepPlan) => ({ shortest, likely, longest })

function acceptance(row: { acceptedName: string, acceptedAt: Date } | undefined): CaseLesson['accepted'] {
  return row ? { by: row.acceptedName, at: row.acceptedAt.toISOString() } : null
}

/**
 * Takes lessons over into the equipment and the kind of work, with their origin. What was accepted
 * before stays as it was. 409: the outage is not sealed; 422: a lesson that is not offered.
 */
export async function acceptLessons(db: Database, person: Person, outage: OutageRow, chosen: LessonsAccepted, now: number): Promise<Lessons> {
  if (outage.phase !== 'sealed') conflict('Nothing is learned from an outage before it is sealed')
  return db.transaction(async (tx) => {
    const offered = await lessonsOf(tx, outage)
    const origin = { outageId: outage.id, outageCode: outage.code, acceptedBy: person.id, acceptedName: person.name, acceptedAt: new Date(now) }
    for (const [index, caseId] of chosen.cases.entries()) {
      const lesson = offered.cases.find(item => item.caseId === caseId)
      if (!lesson || lesson.tauHours === null) unprocessable(`cases[${index}]`, lesson?.not ? `${lesson.name}: ${lesson.not}` : 'This outage teaches nothing of that case')
      else if (!lesson.accepted) await acceptCase(tx, person, outage, { ...origin, caseId, tauHours: lesson.tauHours, readings: lesson.readings, rmseK: lesson.rmseK }, now)
    }
    for (const [index, step] of chosen.steps.entries()) {
      const lesson = offered.steps.find(item => item.step === step)
      if (!lesson || offered.workKind.id === null) unprocessable(`steps[${index}]`, 'This outage teaches nothing of that step')
      else if (!lesson.accepted) await acceptStep(tx, person, { ...origin, workKindId: offered.workKind.id, step, minutes: lesson.minutes, before: lesson.was, after: lesson.proposed }, now)
    }
    return lessonsOf(tx, outage)
  })
}

async function acceptCase(tx: Queries, person: Person, outage: OutageRow, lesson: typeof caseLessons.$inferInsert, now: number): Promise<void> {
  const [known] = await tx.select().from(cases).where(eq(cases.id, lesson.caseId)).for('update')
  const added = await tx.insert(caseLessons).values(lesson).onConflictDoNothing().returning({ id: caseLessons.id })
  if (!known || added.length === 0) return
  const all = await tx.select({ tauHours: caseLessons.tauHours }).from(caseLessons).where(eq(caseLessons.caseId, lesson.caseId))
  const tauHours = combinedTau(all.map(item => item.tauHours))
  await tx.update(cases).set({ tauHours }).where(eq(cases.id, lesson.caseId))
  await keepChange(tx, person, { subject: 'cases', subjectId: known.id, subjectName: known.name, siteId: outage.siteId, deed: 'changed', fields: [{ field: 'tauHours', before: known.tauHours, after: tauHours }, { field: 'learnedFrom', before: null, after: outage.code }] }, now)
}

export async function acceptStep(tx: Queries, person: Person, lesson: typeof stepLessons.$inferInsert, now: number): Promise<void> {
  const [kind] = await tx.select().from(workKinds).where(eq(workKinds.id, lesson.workKindId)).for('update')
  const added = await tx.insert(stepLessons).values(lesson).onConflictDoNothing().returning({ id: stepLessons.id })
  if (!kind || added.length === 0) return
  const corrected = (steps: StepPlan[]) => steps.map(step => step.id === lesson.step ? { ...step, ...lesson.after } : step)
  await tx.update(workKinds).set({ steps: corrected(kind.steps), rollBack: corrected(kind.rollBack) }).where(eq(workKinds.id, kind.id))
  await keepChange(tx, person, { subject: 'work-kind', subjectId: kind.id, subjectName: kind.name, siteId: null, deed: 'changed', fields: [{ field: `step:${lesson.step}`, before: lesson.before, after: lesson.after }, { field: 'learnedFrom', before: null, after: lesson.outageCode }] }, now)
}

/** From how many outages each case's own time constant comes; 0 where somebody has entered another one since. */
export async function tauOrigins(db: Queries, known: readonly { id: string, tauHours: number | null }[]): Promise<Map<string, number>> {
  const ids = known.map(item => item.id)
  const rows = ids.length === 0 ? [] : await db.select({ caseId: caseLessons.caseId, tauHours: caseLessons.tauHours }).from(caseLessons).where(and(inArray(caseLessons.caseId, ids)))
  return new Map(known.map(({ id, tauHours }) => {
    const own = rows.filter(row => row.caseId === id).map(row => row.tauHours)
    const same = own.length > 0 && tauHours !== null && Math.abs(tauHours / combinedTau(own) - 1) < 1e-9
    return [id, same ? own.length : 0]
  }))
}
