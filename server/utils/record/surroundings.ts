import { eq } from 'drizzle-orm'
import type { AnyEntry } from '../../../shared/record/entry'
import type { Surroundings } from '../../../shared/record/rules'
import type { OutageState } from '../../../shared/record/state'
import { files } from '../../database/schema'
import type { Queries } from '../database'
import { marginAt } from '../hold/margin'
import { handBackAfter, planRefusals } from '../order/for-outage'

/** What the engines and the store say about an entry that is being judged. @param root of the log so far, hexadecimal */
export async function surroundingsOf(db: Queries, state: OutageState, entry: AnyEntry, root: () => string): Promise<Surroundings> {
  const sealing = entry.kind === 'sealed'
  const held = sealing ? await db.select({ sha256: files.sha256 }).from(files).where(eq(files.outageId, state.id)) : []
  const known = new Set(held.map(file => file.sha256))
  return {
    planRefusals,
    handBackAfter,
    margin: marginAt,
    filesAwaited: of => of.files.filter(file => !known.has(file)),
    root: sealing ? root() : null,
  }
}
