/** The outbox's ports in memory: a store whose methods are whole transactions, and a server that keeps each device's chain. */
import { entryHash } from '../../shared/record/entry'
import type { AnyEntry } from '../../shared/record/entry'
import type { ChainEnd, OutboxEntry, OutboxStore, PushResult } from '../../app/offline/outbox-ports'
import { isWaiting } from '../../app/offline/outbox-ports'

export interface MemoryStore extends OutboxStore { held: Map<string, OutboxEntry>, chains: Map<string, ChainEnd> }

/** A store in memory. Give a fault to `before` to make a method fail before it did anything. */
export function memoryStore(before: (method: keyof OutboxStore) => Promise<void> = async () => {}): MemoryStore {
  const held = new Map<string, OutboxEntry>()
  const chains = new Map<string, ChainEnd>()
  let lastPlace = 0
  const keyOf = (device: string, outage: string) => `${device}/${outage}`
  return {
    held,
    chains,
    async entries(outage) {
      await before('entries')
      return [...held.values()].filter(kept => outage === undefined || kept.outage === outage).sort((one, other) => one.place - other.place).map(kept => structuredClone(kept))
    },
    async chain(device, outage) {
      await before('chain')
      return chains.get(keyOf(device, outage)) ?? null
    },
    async keep(entry, from, end) {
      await before('keep')
      const key = keyOf(entry.device, entry.outage)
      const now = chains.get(key) ?? null
      if (now?.n !== from?.n || now?.hash !== from?.hash) return null
      if (held.has(entry.id)) throw new Error('this id is kept already')
      held.set(entry.id, structuredClone({ ...entry, place: ++lastPlace }))
      chains.set(key, end)
      return lastPlace
    },
    async settle({ outage, received, refused }) {
      await before('settle')
      for (const { id, receipt } of received) {
        const kept = held.get(id)
        if (kept && isWaiting(kept)) kept.receipt = receipt
      }
      for (const { id, refusal, after } of refused) {
        const kept = held.get(id)
        if (!kept || !isWaiting(kept)) continue
        kept.refusal = refusal
        if (!after) continue
        for (const later of held.values()) if (later.outage === outage && later.device === after.device && later.n > after.n && isWaiting(later)) later.refusal = after.refusal
        if (after.end) chains.set(keyOf(after.device, outage), after.end)
        else chains.delete(keyOf(after.device, outage))
      }
    },
    async dismiss(id) {
      await before('dismiss')
      const kept = held.get(id)
      if (!kept?.refusal) return null
      held.delete(id)
      return kept.outage
    },
    async collect(outage, seq) {
      await before('collect')
      const gone = [...held.values()].filter(kept => kept.outage === outage && kept.receipt !== null && kept.receipt.seq <= seq)
      for (const kept of gone) held.delete(kept.id)
      return gone.length > 0
    },
  }
}

/** A server of one outage each: takes entries by the chains of their devices, and answers a replay as the first time. */
export class MemoryServer {
  /** whose session it is */
  session: string | null = null
  readonly logs = new Map<string, AnyEntry[]>()
  /** refusals by reason that take their place (or not) in the chain, for entries whose note says so */
  refuses: (entry: AnyEntry) => { code: number, recorded: boolean } | null = () => null
  private readonly answers = new Map<string, PushResult>()
  private readonly chains = new Map<string, ChainEnd>()

  push(outage: string, items: { entry: AnyEntry, signature: string }[]): PushResult[] {
    return items.map(({ entry }) => {
      const earlier = this.answers.get(entry.id)
      if (earlier) return earlier
      if (entry.by !== this.session) return { id: entry.id, status: 'refused', code: 403, field: null, reason: 'signed by another', recorded: false, later: 'signer' }
      const key = `${entry.device}/${outage}`
      const end = this.chains.get(key)
      if (entry.n !== (end?.n ?? 0) + 1 || entry.prev !== (end?.hash ?? null)) return { id: entry.id, status: 'refused', code: 409, field: null, reason: 'does not come next', recorded: false }
      const refusal = this.refuses(entry)
      if (refusal && !refusal.recorded) return { id: entry.id, status: 'refused', field: null, reason: 'refused', ...refusal }
      this.chains.set(key, { n: entry.n, hash: entryHash(entry) })
      const log = this.logs.get(outage) ?? []
      this.logs.set(outage, log)
      if (!refusal) log.push(entry)
      const answer: PushResult = refusal
        ? { id: entry.id, status: 'refused', field: null, reason: 'refused', ...refusal }
        : { id: entry.id, status: 'accepted', seq: log.length, receivedAt: entry.at, why: [] }
      this.answers.set(entry.id, answer)
      return answer
    })
  }
}
