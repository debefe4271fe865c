import { z } from 'zod'
import type { SignedEntry } from '~~/shared/record/entry'
import { pushSchema } from '~~/shared/record/entry'
import { requirePerson } from '~~/server/utils/access'
import { useDatabase } from '~~/server/utils/database'
import { readBodyAs, readParamsAs } from '~~/server/utils/parse'
import { markSeen } from '~~/server/utils/people/devices'
import type { PushAnswer } from '~~/server/utils/record/append'
import { appendEntries } from '~~/server/utils/record/append'
import { wakeWatch } from '~~/server/utils/watch/wake'

const PUSH_MAX_BYTES = 4_000_000
const params = z.object({ id: z.string().uuid().toLowerCase() })

/**
 * Takes signed entries. 200: all are in the record (accepted or questioned). Where a single entry, or
 * every one, is refused, the answer's status is the first refusal's; where some are, 207.
 */
export default defineEventHandler(async (event) => {
  const person = requirePerson(event)
  const { id } = readParamsAs(event, params, 'outage')
  const { entries, seen } = await readBodyAs(event, pushSchema, PUSH_MAX_BYTES)
  const [db, now] = [useDatabase(), Date.now()]
  const answer = await appendEntries(db, person, id, entries, now, seen)
  wakeWatch(db, id)
  await markSeen(db, person.id, devicesTaken(entries, answer), now)
  setResponseStatus(event, statusOf(answer))
  return withReason(answer)
})

/** Devices whose signatures were found good. */
function devicesTaken(entries: unknown[], { results }: PushAnswer): string[] {
  const taken = entries.filter((_item, index) => results[index]?.status !== 'refused')
  return [...new Set(taken.map(item => (item as SignedEntry).entry.device))]
}

function statusOf({ results }: PushAnswer): number {
  const refused = results.filter(result => result.status === 'refused')
  if (refused.length === 0) return 200
  return refused.length === results.length ? refused[0]!.code : 207
}

/** The first refusal also stands where every error of this API has its reason. */
function withReason(answer: PushAnswer) {
  const refused = answer.results.find(result => result.status === 'refused')
  return refused ? { ...answer, statusCode: statusOf(answer), message: refused.reason, data: { field: refused.field, reason: refused.reason } } : answer
}
