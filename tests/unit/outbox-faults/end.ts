/** What must be true when a history has ended: nothing lost, doubled, out of order, under another's name, refused without cause or left. */
import { isWaiting } from '../../../app/offline/outbox-ports'
import type { AnyEntry, StoredEntry } from '../../../shared/record/entry'
import type { Deed, Shown, Told } from './history'

const wordsOf = ({ entry }: { entry: AnyEntry }) => {
  const body: Record<string, unknown> = entry.body
  return String(body.words ?? body.note ?? '')
}

/** @returns what is wrong, in words */
export function judgeEnd(told: Told): string[] {
  const { phones, server, deeds } = told
  const faults: string[] = []
  const logs = [...server.committed.values()].map(({ log }) => log)
  const byId = new Map(logs.flat().map(stored => [stored.entry.id, stored]))
  const byWords = new Map(deeds.map(deed => [deed.words, deed]))
  for (const log of logs) faults.push(...inLog(log, byWords))
  for (const item of told.shown) faults.push(...outcome(told, item, byId, byWords))
  for (const phone of phones) {
    for (const kept of phone.store.held.values()) {
      if (isWaiting(kept)) faults.push(`left: entry ${kept.n} of ${phone.name}`)
      if (kept.refusal && byId.has(kept.id)) faults.push(`told wrongly: entry ${kept.n} is in the record and shown as refused`)
      const stored = byId.get(kept.id)
      if (kept.receipt && (stored?.seq !== kept.receipt.seq || stored.standing !== kept.receipt.status)) faults.push(`told wrongly: the receipt of entry ${kept.n}`)
    }
  }
  return faults
}

/** Each deed at most once, under its own name, and what a device signed in the order in which it did. */
function inLog(log: StoredEntry[], byWords: Map<string, Deed>): string[] {
  const faults: string[] = []
  const seen = new Set<string>()
  for (const stored of log) {
    const words = wordsOf(stored)
    const deed = byWords.get(words)
    if (!deed) continue
    if (seen.has(words)) faults.push(`doubled: ${words}`)
    seen.add(words)
    const { by, device, outage } = stored.entry
    if (by !== deed.by || device !== deed.device) faults.push(`under a wrong name: ${words}`)
    if (outage !== deed.outage) faults.push(`in a wrong outage: ${words}`)
  }
  return faults
}

/** What was called kept is in the record, after what its device signed before it, or was refused with cause and is shown so. */
function outcome({ shown, seen }: Told, item: Shown, byId: Map<string, StoredEntry>, byWords: Map<string, Deed>): string[] {
  const { id, phone, deed, place } = item
  const stored = byId.get(id)
  if (stored) {
    const late = shown.some(other => other.phone === phone && other.deed.device === deed.device && other.deed.outage === deed.outage && other.place < place && (byId.get(other.id)?.seq ?? 0) > stored.seq)
    return late ? [`reordered: ${deed.words}`] : []
  }
  const kept = phone.store.held.get(id)
  if (!kept?.refusal && !seen.has(id)) return [`lost: ${deed.words}`]
  return isDue(item, byWords) ? [] : [`refused without cause: ${deed.words} (${kept?.refusal?.reason ?? 'seen'})`]
}

/** It was wrong in itself, its device was revoked, or its signer could not yet know that one before it took no place in the chain. */
function isDue({ phone, deed, place }: Shown, byWords: Map<string, Deed>): boolean {
  if (deed.bad !== null || phone.server.revoked.has(deed.device)) return true
  return [...phone.everKept.values()].some(before => before.device === deed.device && before.outage === deed.outage && before.place < place
    && !deed.after.has(before.id) && byWords.get(wordsOf(before))?.bad === 'signature')
}
