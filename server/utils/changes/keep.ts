import { uuidv7 } from '../../../shared/record/uuid'
import type { ChangeDeed, ChangeSubject, FieldChange } from '../../../shared/schemas/changes'
import { changes } from '../../database/schema'
import type { Queries } from '../database'

/** Who changes something, or takes records away. */
export interface Changer { id: string, name: string }

export interface ChangeToKeep {
  subject: ChangeSubject
  subjectId: string
  subjectName: string
  siteId: string | null
  deed: ChangeDeed
  fields: FieldChange[]
}

/** Writes what was changed, in the transaction that changes it. A change of nothing is not written. */
export async function keepChange(tx: Queries, by: Changer, change: ChangeToKeep, now = Date.now()): Promise<void> {
  if (change.deed === 'changed' && change.fields.length === 0) return
  await tx.insert(changes).values({ id: uuidv7(now), at: new Date(now), personId: by.id, personName: by.name, ...change })
}
