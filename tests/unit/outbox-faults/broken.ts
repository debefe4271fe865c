/** Outboxes broken on purpose, each as somebody might write it: the histories must find every one of them. */
import type { ChainEnd, OutboxStore, PushResult, Send } from '../../../app/offline/outbox-ports'
import { isWaiting, Unsent } from '../../../app/offline/outbox-ports'
import type { AnyEntry } from '../../../shared/record/entry'
import { entryBytes } from '../../../shared/record/entry'
import { uuidFor } from '../../support/record'
import type { Break } from './history'
import type { Phone } from './phone'

type Items = Parameters<Send>[1]

const sending = (change: (phone: Phone, send: Send) => Send): Break => (phone, ports) => ({ ...ports, send: change(phone, ports.send) })
const storing = (change: (phone: Phone, store: OutboxStore) => Partial<OutboxStore>): Break => (phone, ports) => ({ ...ports, store: { ...ports.store, ...change(phone, ports.store) } })
const accepted = (items: Items): PushResult[] => items.map(({ entry }) => ({ id: entry.id, status: 'accepted', seq: 1, receivedAt: entry.at, why: [] }))
const refused = (items: Items): PushResult[] => items.map(({ entry }) => ({ id: entry.id, status: 'refused', code: 422, field: null, reason: 'not sent', recorded: false }))
/** Does something where a push has no answer for one of these reasons. */
const onTrouble = (troubles: Unsent['trouble'][], then: (phone: Phone, items: Items, error: Unsent) => PushResult[]) => sending((phone, send) => async (outage, items) => {
  try {
    return await send(outage, items)
  } catch (error) {
    if (error instanceof Unsent && troubles.includes(error.trouble)) return then(phone, items, error)
    throw error
  }
})
const forget = (phone: Phone, items: Items) => { for (const { entry } of items) phone.store.held.delete(entry.id) }
const resigned = (phone: Phone, entry: AnyEntry) => ({ entry, signature: phone.signers.find(({ device }) => device === entry.device)!.sign(entryBytes(entry)) })

export const BROKEN: Record<string, Break> = {
  'deletes before the receipt': sending((phone, send) => async (outage, items) => {
    forget(phone, items)
    return send(outage, items)
  }),

  'makes a new id at each try': sending((phone, send) => async (outage, items) => {
    const fresh = items.map(({ entry }) => resigned(phone, { ...entry, id: uuidFor(`${phone.name} again ${++phone.ids}`, phone.clock) }))
    const results = await send(outage, fresh)
    return results.map(result => ({ ...result, id: items[fresh.findIndex(({ entry }) => entry.id === result.id)]?.entry.id ?? result.id }) as PushResult)
  }),

  'signs again under whoever is there now': (phone, ports) => ({
    ...ports,
    store: { ...ports.store, entries: async outage => (await ports.store.entries(outage)).map(kept => ({ ...kept, person: phone.session ?? kept.person })) },
    send: (outage, items) => {
      const signer = phone.signers.find(({ id }) => id === phone.session) ?? phone.signers[0]!
      const chain = phone.server.committed.get(outage)!.state.chain[signer.device]
      return ports.send(outage, items.map(({ entry, signature }) => entry.by === signer.id ? { entry, signature } : resigned(phone, { ...entry, by: signer.id, device: signer.device, n: (chain?.n ?? 0) + 1, prev: chain?.hash ?? null })))
    },
  }),

  'sends entries side by side': sending((_phone, send) => async (outage, items) => (await Promise.all(items.map(item => send(outage, [item])))).flat()),

  'sends an entry ahead of those before it': storing((_phone, store) => ({ entries: async outage => (await store.entries(outage)).reverse() })),

  'sends in the order of the clock': storing((_phone, store) => ({ entries: async outage => (await store.entries(outage)).sort((one, other) => one.keptAt.localeCompare(other.keptAt)) })),

  'forgets its chain when the tab dies': (_phone, ports) => {
    const ends = new Map<string, ChainEnd>()
    return { ...ports, store: {
      ...ports.store,
      chain: async (device, outage) => ends.get(device + outage) ?? null,
      keep: async (entry, _from, end) => {
        ends.set(entry.device + entry.outage, end)
        return ports.store.keep(entry, await ports.store.chain(entry.device, entry.outage), end)
      },
    } }
  },

  'forgets the hash of the entry before': storing((_phone, store) => ({
    chain: async (device, outage) => {
      const end = await store.chain(device, outage)
      return end && { ...end, hash: '0'.repeat(64) }
    },
    keep: async (entry, _from, end) => store.keep(entry, await store.chain(entry.device, entry.outage), end),
  })),

  'lets two tabs take the same place in the chain': (phone, ports) => ({
    ...ports,
    locks: { run: (_name, task) => task() },
    store: { ...ports.store, keep: async (entry, _from, end) => ports.store.keep(entry, phone.store.chains.get(`${entry.device}/${entry.outage}`) ?? null, end) },
  }),

  'marks as sent what had no answer': onTrouble(['away'], (_phone, items) => accepted(items)),

  'lets go of all when the session has ended': onTrouble(['signed-out'], (phone, items, error) => {
    forget(phone, items)
    throw error
  }),

  'takes a failing server for a refusal': onTrouble(['failed'], (_phone, items) => refused(items)),

  'takes a network that is away for a refusal': onTrouble(['away'], (_phone, items) => refused(items)),

  'takes "another\'s to send" for a refusal': sending((_phone, send) => async (outage, items) => (await send(outage, items)).map(result => result.status === 'refused' ? { ...result, later: undefined } : result)),

  'takes the first answer for the answer to all': sending((_phone, send) => async (outage, items) => {
    const [first] = await send(outage, items)
    return first ? items.map(({ entry }) => ({ ...first, id: entry.id })) : []
  }),

  'takes answers by their place and not by their id': sending((_phone, send) => async (outage, items) => (await send(outage, items)).map((result, index) => ({ ...result, id: items[index]!.entry.id }))),

  'calls kept what is still on its way to the disk': storing((_phone, store) => ({ keep: async (...given) => {
    void store.keep(...given).catch(() => null)
    return 1
  } })),

  'calls kept what the full storage did not take': storing((_phone, store) => ({ keep: async (...given) => {
    try {
      return await store.keep(...given)
    } catch {
      return 1
    }
  } })),

  'clears the storage at a change of users': sending((phone, send) => async (outage, items) => {
    for (const kept of phone.store.held.values()) if (kept.person !== phone.session) phone.store.held.delete(kept.id)
    return send(outage, items)
  }),

  'lets go of what waits when the log has come': storing((phone, store) => ({ collect: async (outage, size) => {
    for (const kept of phone.store.held.values()) if (kept.outage === outage && isWaiting(kept) && kept.n <= size) phone.store.held.delete(kept.id)
    return store.collect(outage, size)
  } })),

  'lets go of refusals that nobody saw': storing((phone, store) => ({ settle: async (settlement) => {
    await store.settle(settlement)
    for (const { id } of settlement.refused) phone.store.held.delete(id)
  } })),

  'goes on past an entry on which the server fails': (_phone, ports) => {
    const skipped = new Set<string>()
    return { ...ports,
      store: { ...ports.store, entries: async outage => (await ports.store.entries(outage)).filter(({ id }) => !skipped.has(id)) },
      send: async (outage, items) => ports.send(outage, items).catch((error: unknown) => {
        if (error instanceof Unsent && error.trouble === 'failed') skipped.add(items[0]!.entry.id)
        throw error
      }) }
  },

  'goes on after a refusal as if its place were taken': storing((_phone, store) => ({ settle: settlement => store.settle({ ...settlement, refused: settlement.refused.map(item => ({ ...item, after: null })) }) })),
}
