import { FOLD_VERSION } from '../../../shared/record/state'
import type { Person } from '../access'
import type { Database } from '../database'
import { isTelling } from '../alerts/hasten'
import { isCounted } from '../insights/keep'
import { bearsOnSearch } from '../records/facts'
import { writtenBy } from '../records/save'
import { LEXEMES_MAX, TEXT_MAX } from '../records/words'
import type { Draft } from './draft'
import { isFoldNear, markSaved, projectionOf } from './draft'
import type { LogEnd } from './seen'

/**
 * One statement, and so one transaction and one way to the database and back: it takes the row's lock, and stores
 * only where all that the push was decided upon still holds. Where another process wrote meanwhile, the row has
 * another size or root, and nothing is stored.
 */
const STORE_GROWN = `
with fresh as materialized (
  select * from json_to_recordset($7::json) as fresh(seq int, id uuid, kind text, "personId" uuid, "deviceId" uuid, n int, hash text, signed text, signature text, "receivedAt" timestamptz, standing text, why jsonb, checkpoint jsonb)
), grown as (
  update outages set phase = $8, size = $9, frontier = $10, checkpoint = $11, work_kind = $12, points_in_hand = $13,
    starts_at = $14, dark_at = $15, ended_at = $16, updated_at = $17, state = coalesce($18, state), fold_version = coalesce($19, fold_version)
  where id = $1 and size = $2 and checkpoint #>> '{statement,root}' = $3
    and ($4::uuid is null or exists (select from site_access where person_id = $4 and site_id = outages.site_id))
    and exists (select from devices where id = $5 and public_key = $6 and person_id = $20 and revoked_at is null)
    and not exists (select from refusals where id in (select id from fresh))
  returning id
), found as (
  update outage_search set words = case when length(words) < ${LEXEMES_MAX} then words || strip(to_tsvector('english', $21)) else words end
  where $21 <> '' and outage_id = (select id from grown)
)
insert into entries (outage_id, seq, id, kind, person_id, device_id, n, hash, signed, signature, received_at, standing, why, checkpoint)
select grown.id, fresh.* from grown, fresh`

/** Whether nothing is to be written of added entries but the log, its projection and the words by which it is found. */
export function isLogAlone({ rows, cached, state }: Draft): boolean {
  if (cached === null || isCounted(state.phase)) return false
  return !rows.some(row => isTelling(row) || bearsOnSearch({ kind: row.kind, standing: row.standing }))
}

/**
 * Stores the entries that a draft added and its projection, if the log still ends where the draft began, the person
 * may still see the site, the device is still theirs and not revoked, and none of the ids was refused before.
 * @returns whether it was stored
 * @throws what the database says where an id or a place in a device's chain is taken (23505), or it is away
 */
export async function storeGrown(db: Database, draft: Draft, began: LogEnd, person: Person, device: { id: string, publicKey: string }): Promise<boolean> {
  const { phase, size, frontier, checkpoint, workKind, pointsInHand, startsAt, darkAt, endedAt, updatedAt } = projectionOf(draft)
  const isNear = isFoldNear(draft)
  const rows = draft.rows.map(({ outageId: _, ...row }) => row)
  const { count } = await db.$client.unsafe(STORE_GROWN, [
    draft.state.id, began.size, began.root, person.role === 'administrator' ? null : person.id, device.id, device.publicKey, JSON.stringify(rows),
    phase, size, JSON.stringify(frontier), JSON.stringify(checkpoint), workKind, pointsInHand, iso(startsAt), iso(darkAt), iso(endedAt), iso(updatedAt),
    isNear ? null : JSON.stringify(draft.state), isNear ? null : FOLD_VERSION, person.id, writtenBy(draft.rows).slice(0, TEXT_MAX),
  ], { prepare: true })
  if (count === 0) return false
  markSaved(draft)
  return true
}

const iso = (date: Date | null) => date?.toISOString() ?? null
