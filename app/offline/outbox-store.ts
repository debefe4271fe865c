import { chainKey, openKept, STRICT } from './database'
import type { OutboxEntry, OutboxStore } from './outbox-ports'
import { isWaiting } from './outbox-ports'

const byPlace = (one: OutboxEntry, other: OutboxEntry) => one.place - other.place

/** The outbox's store in IndexedDB: each change is one strictly durable transaction. */
export const outboxStore: OutboxStore = {
  async entries(outage) {
    const database = await openKept()
    const found = outage === undefined ? await database.getAll('outbox') : await database.getAllFromIndex('outbox', 'outage', outage)
    return found.sort(byPlace)
  },

  async chain(device, outage) {
    return await (await openKept()).get('chains', chainKey(device, outage)) ?? null
  },

  async keep(entry, from, end) {
    const tx = (await openKept()).transaction(['outbox', 'chains'], 'readwrite', STRICT)
    const chains = tx.objectStore('chains')
    const outbox = tx.objectStore('outbox')
    const key = chainKey(entry.device, entry.outage)
    const held = await chains.get(key) ?? null
    if (held?.n !== from?.n || held?.hash !== from?.hash) {
      await tx.done
      return null
    }
    const last = await outbox.index('place').openKeyCursor(null, 'prev')
    const place = Number(last?.key ?? 0) + 1
    // `add` fails on an id that is there; the transaction then keeps nothing.
    await Promise.all([outbox.add({ ...entry, place }), chains.put(end, key), tx.done])
    return place
  },

  async settle({ outage, received, refused }) {
    const tx = (await openKept()).transaction(['outbox', 'chains'], 'readwrite', STRICT)
    const outbox = tx.objectStore('outbox')
    for (const { id, receipt } of received) {
      const kept = await outbox.get(id)
      if (kept && isWaiting(kept)) await outbox.put({ ...kept, receipt })
    }
    for (const { id, refusal, after } of refused) {
      const kept = await outbox.get(id)
      if (!kept || !isWaiting(kept)) continue
      await outbox.put({ ...kept, refusal })
      if (!after) continue
      for (const later of await outbox.index('outage').getAll(outage)) {
        if (later.device === after.device && later.n > after.n && isWaiting(later)) await outbox.put({ ...later, refusal: after.refusal })
      }
      const key = chainKey(after.device, outage)
      if (after.end) await tx.objectStore('chains').put(after.end, key)
      else await tx.objectStore('chains').delete(key)
    }
    await tx.done
  },

  async dismiss(id) {
    const tx = (await openKept()).transaction('outbox', 'readwrite', STRICT)
    const kept = await tx.store.get(id)
    if (kept?.refusal) await tx.store.delete(id)
    await tx.done
    return kept?.refusal ? kept.outage : null
  },

  async collect(outage, seq) {
    const tx = (await openKept()).transaction('outbox', 'readwrite', STRICT)
    const held = (await tx.store.index('outage').getAll(outage)).filter(kept => kept.receipt !== null && kept.receipt.seq <= seq)
    for (const kept of held) await tx.store.delete(kept.id)
    await tx.done
    return held.length > 0
  },
}
