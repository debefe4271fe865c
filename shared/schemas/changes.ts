import { z } from 'zod'
import { RESOURCE_NAMES } from './site-view'

/** What an administrator changes, or somebody takes away; its history is kept for ever. */
export const CHANGE_SUBJECTS = ['site', 'limits', 'alerts', ...RESOURCE_NAMES, 'person', 'work-kind', 'export', 'retention', 'record'] as const
export type ChangeSubject = (typeof CHANGE_SUBJECTS)[number]

export const CHANGE_DEEDS = ['added', 'changed', 'deleted', 'exported', 'downloaded'] as const
export type ChangeDeed = (typeof CHANGE_DEEDS)[number]

/** One field before and after; null: there was nothing, or is nothing any more. */
export interface FieldChange { field: string, before: unknown, after: unknown }

/** One act of an administrator, as it reads in a history. */
export interface ChangeItem {
  id: string
  /** ISO 8601 UTC */
  at: string
  by: string
  subject: ChangeSubject
  subjectId: string
  subjectName: string
  deed: ChangeDeed
  fields: FieldChange[]
}

/** Who set something last, and when (ISO 8601 UTC). */
export interface SettingMark { at: string, by: string }

/** Who changed each field last, and when. @param latestFirst changes of one thing */
export function settingMarks(latestFirst: readonly Pick<ChangeItem, 'at' | 'by' | 'fields'>[]): Record<string, SettingMark> {
  const marks: Record<string, SettingMark> = {}
  for (const { at, by, fields } of latestFirst) {
    for (const { field } of fields) marks[field] ??= { at, by }
  }
  return marks
}

/** A page of a history; `next` is asked for as `before`. */
export interface ChangePage { items: ChangeItem[], next: string | null }

/** Subjects of no one site's equipment, whose histories are read on their own. */
const LISTED_SUBJECTS = ['person', 'work-kind', 'export', 'retention', 'record'] as const

export const changePageSchema = z.object({ before: z.string().uuid().optional() })
export const changeListSchema = changePageSchema.extend({
  subject: z.enum(LISTED_SUBJECTS, { errorMap: () => ({ message: `Choose one of ${LISTED_SUBJECTS.join(', ')}` }) }),
  subjectId: z.string().uuid().optional(),
})
