// Source of the chain's form: docs/record-format.md. Everything else: common practice, no source.
import { describe, expect, it } from 'vitest'
import { createOutbox, tabLocks, Unsent } from '~/offline/outbox'
import type { Locks, Send, Signing } from '~/offline/outbox'
import { entryHash } from '~~/shared/record/entry'
import { uuidv7 } from '~~/shared/record/uuid'
import { MemoryServer, memoryStore } from '../../support/outbox'

const TESS: Signing = { person: uuidv7(1), device: uuidv7(2), sign: async () => 'x'.repeat(86) }
const RAY: Signing = { person: uuidv7(3), device: uuidv7(4), sign: async () => 'y'.repeat(86) }
const OUTAGE = uuidv7(5)
const OTHER = uuidv7(6)

function phone({ locks = tabLocks(), send }: { locks?: Locks, send?: (server: MemoryServer) => Send } = {}) {
  const server = new MemoryServer()
  server.session = TESS.person
  const store = memoryStore()
  let clock = Date.UTC(2026, 2, 3)
  const ports = { store, send: send?.(server) ?? (async (outage, items) => server.push(outage, items)), locks, now: () => clock, newId: uuidv7 }
  const outbox = createOutbox(ports)
  return { server, store, ports, outbox, setClock: (ms: number) => { clock = ms }, note: (words: string, by = TESS, outage = OUTAGE) => outbox.keep(by, outage, 'note-added', { words }, 0, null) }
}
const words = (server: MemoryServer, outage = OUTAGE) => (server.logs.get(outage) ?? []).map(entry => (entry.body as { words: string }).words)
const waiting = async ({ outbox }: ReturnType<typeof phone>) => (await outbox.entries()).filter(kept => !kept.receipt && !kept.refusal)

describe('keeping', () => {
  it('counts from 1 without gaps and names the hash of the entry before', async () => {
    const { note } = phone()
    const one = await note('one')
    const two = await note('two')
    expect([one.n, one.entry.prev, two.n, two.entry.prev]).toEqual([1, null, 2, entryHash(one.entry)])
  })

  it('goes on from the log where that knows more than this device', async () => {
    const { outbox } = phone()
    const kept = await outbox.keep(TESS, OUTAGE, 'note-added', { words: 'on' }, 0, { n: 7, hash: 'a'.repeat(64) })
    expect([kept.n, kept.entry.prev]).toEqual([8, 'a'.repeat(64)])
  })

  it('makes no gap and no fork where tabs sign at the same time without locks', async () => {
    const { note, outbox } = phone({ locks: { run: (_name, task) => task() } })
    await Promise.all(Array.from({ length: 12 }, (_, index) => note(`${index}`)))
    const kept = await outbox.entries(OUTAGE)
    expect(kept.map(item => item.n)).toEqual(kept.map((_, index) => index + 1))
    for (const [index, item] of kept.entries()) expect(item.entry.prev).toBe(index === 0 ? null : entryHash(kept[index - 1]!.entry))
  })

  it('keeps nothing of an entry whose storage failed', async () => {
    const full = new DOMException('full', 'QuotaExceededError')
    const store = memoryStore(async (method) => { if (method === 'keep') throw full })
    const outbox = createOutbox({ store, send: async () => [], locks: tabLocks(), now: () => 0, newId: uuidv7 })
    await expect(outbox.keep(TESS, OUTAGE, 'note-added', { words: 'one' }, 0, null)).rejects.toBe(full)
    expect([store.held.size, store.chains.size]).toEqual([0, 0])
  })

  it('keeps the order of signing when the clock goes back', async () => {
    const it = phone()
    await it.note('first')
    it.setClock(Date.UTC(2026, 2, 2))
    await it.note('second')
    await it.outbox.drain(OUTAGE, TESS.person)
    expect(words(it.server)).toEqual(['first', 'second'])
  })
})

describe('sending', () => {
  it('sends in order, a receipt each, and lets go once the log holds them', async () => {
    const it = phone()
    for (let index = 0; index < 120; index++) await it.note(`${index}`)
    const { answers, trouble } = await it.outbox.drain(OUTAGE, TESS.person)
    expect([answers.size, trouble]).toEqual([120, null])
    expect(words(it.server)).toEqual(Array.from({ length: 120 }, (_, index) => `${index}`))
    expect(await waiting(it)).toEqual([])
    expect(it.store.held.size).toBe(120)
    await it.outbox.collect(OUTAGE, 119)
    expect(it.store.held.size).toBe(1)
    await it.outbox.collect(OUTAGE, 120)
    expect(it.store.held.size).toBe(0)
  })

  it('loses and doubles nothing when answers are lost', async () => {
    let lost = 3
    const it = phone({ send: server => async (outage, items) => {
      const results = server.push(outage, items)
      if (lost-- > 0) throw new Unsent('away')
      return results
    } })
    for (const text of ['one', 'two', 'three']) await it.note(text)
    for (let tries = 0; tries < 3; tries++) expect((await it.outbox.drain(OUTAGE, TESS.person)).trouble).toBe('away')
    expect(await waiting(it)).toHaveLength(3)
    expect((await it.outbox.drain(OUTAGE, TESS.person)).trouble).toBeNull()
    expect(words(it.server)).toEqual(['one', 'two', 'three'])
  })

  it('keeps what has no answer among the answers', async () => {
    const it = phone({ send: server => async (outage, items) => server.push(outage, items).slice(0, 1) })
    await it.note('one')
    await it.note('two')
    expect((await it.outbox.drain(OUTAGE, TESS.person)).trouble).toBe('failed')
    expect((await waiting(it)).map(kept => kept.n)).toEqual([2])
  })

  it('takes answers by their id, in whatever order they come', async () => {
    const it = phone({ send: server => async (outage, items) => server.push(outage, items).reverse() })
    const kept = [await it.note('one'), await it.note('two')]
    await it.outbox.drain(OUTAGE, TESS.person)
    expect(kept.map(({ id }) => it.store.held.get(id)?.receipt?.seq)).toEqual([1, 2])
  })

  it.each(['away', 'signed-out', 'missing'] as const)('keeps everything and says so: %s', async (trouble) => {
    const it = phone({ send: () => async () => { throw new Unsent(trouble) } })
    await it.note('one')
    expect((await it.outbox.drain(OUTAGE, TESS.person)).trouble).toBe(trouble)
    expect(await waiting(it)).toHaveLength(1)
  })

  it('sends only what the person signed, and keeps it where the session is another\'s', async () => {
    const it = phone()
    await it.note('hers')
    await it.note('his', RAY)
    await it.outbox.drain(OUTAGE, TESS.person)
    expect(words(it.server)).toEqual(['hers'])
    expect((await it.outbox.drain(OUTAGE, RAY.person)).trouble).toBe('another-signer')
    expect((await waiting(it)).map(kept => kept.person)).toEqual([RAY.person])
    it.server.session = RAY.person
    await it.outbox.drain(OUTAGE, RAY.person)
    expect(words(it.server)).toEqual(['hers', 'his'])
  })

  it('sends other outages where one is in trouble', async () => {
    const it = phone({ send: server => async (outage, items) => {
      if (outage === OUTAGE) throw new Error('something nobody thought of')
      return server.push(outage, items)
    } })
    await it.note('stuck')
    await it.note('free', TESS, OTHER)
    const drained = await it.outbox.drainAll(TESS.person)
    expect([drained.get(OUTAGE)?.trouble, drained.get(OTHER)?.trouble]).toEqual(['failed', null])
    expect(words(it.server, OTHER)).toEqual(['free'])
  })

  it('sends what comes before an entry on which the server fails', async () => {
    const it = phone({ send: server => async (outage, items) => {
      if (items.some(({ entry }) => entry.n === 4)) throw new Unsent('failed')
      return server.push(outage, items)
    } })
    for (const text of ['1', '2', '3', '4', '5']) await it.note(text)
    expect((await it.outbox.drain(OUTAGE, TESS.person)).trouble).toBe('failed')
    expect(words(it.server)).toEqual(['1', '2', '3'])
    expect((await waiting(it)).map(kept => kept.n)).toEqual([4, 5])
  })
})

describe('refusals', () => {
  const refusing = (text: string, recorded: boolean) => {
    const it = phone()
    it.server.refuses = entry => (entry.body as { words: string }).words === text ? { code: 422, recorded } : null
    return it
  }

  it('stay until the signer has seen them; nothing else can be dismissed', async () => {
    const it = refusing('bad', true)
    const bad = await it.note('bad')
    const good = await it.note('good')
    await it.outbox.drain(OUTAGE, TESS.person)
    expect(words(it.server)).toEqual(['good'])
    expect(it.store.held.get(bad.id)?.refusal?.reason).toBe('refused')
    await it.outbox.dismiss(good.id)
    await it.outbox.dismiss(bad.id)
    expect([...it.store.held.keys()]).toEqual([good.id])
  })

  it('that took no place break what was signed after them, and the chain goes on from before', async () => {
    const it = refusing('bad', false)
    for (const text of ['good', 'bad', 'after']) await it.note(text)
    await it.outbox.drain(OUTAGE, TESS.person)
    expect([...it.store.held.values()].map(kept => kept.refusal?.code ?? 'received')).toEqual(['received', 422, 409])
    expect((await it.note('again')).n).toBe(2)
    await it.outbox.drain(OUTAGE, TESS.person)
    expect(words(it.server)).toEqual(['good', 'again'])
  })

  it('break what was signed while they were on their way too', async () => {
    const it = phone({ send: server => async (outage, items) => {
      await it.note('meanwhile')
      return server.push(outage, items)
    } })
    it.server.refuses = entry => entry.n === 1 && (entry.body as { words: string }).words === 'bad' ? { code: 422, recorded: false } : null
    await it.note('bad')
    await it.outbox.drain(OUTAGE, TESS.person)
    expect((await it.outbox.entries()).map(kept => kept.refusal !== null)).toEqual([true, true])
  })

  it('told twice by two tabs do not break what was signed anew in between', async () => {
    const it = refusing('bad', false)
    const settle = it.store.settle
    let told: Parameters<typeof settle>[0] | null = null
    it.store.settle = async (settlement) => { told ??= settlement; await settle(settlement) }
    await it.note('bad')
    await it.outbox.drain(OUTAGE, TESS.person)
    await it.note('again')
    await settle(told!)
    expect((await waiting(it)).map(kept => (kept.entry.body as { words: string }).words)).toEqual(['again'])
  })
})

describe('an entry of a newer kind than the server knows', () => {
  it('waits, and what comes after it waits too', async () => {
    const it = phone({ send: server => async (outage, items) => server.push(outage, items.filter(({ entry }) => entry.n < 2)).concat(items.filter(({ entry }) => entry.n >= 2).map(({ entry }) => ({ id: entry.id, status: 'refused' as const, code: 422, field: 'v', reason: 'not known yet', recorded: false, later: 'version' as const }))) })
    for (const text of ['1', '2', '3']) await it.note(text)
    expect((await it.outbox.drain(OUTAGE, TESS.person)).trouble).toBe('newer')
    expect((await waiting(it)).map(kept => kept.n)).toEqual([2, 3])
  })
})

describe('a log that is not the one that this device saw', () => {
  it('gets nothing: what was signed waits, and is not refused', async () => {
    const it = phone({ send: () => async (_outage, items) => items.map(({ entry }) => ({ id: entry.id, status: 'refused' as const, code: 409, field: null, reason: 'another log', recorded: false, later: 'log' as const })) })
    for (const text of ['1', '2']) await it.note(text)
    expect((await it.outbox.drain(OUTAGE, TESS.person)).trouble).toBe('other-log')
    expect((await waiting(it)).map(kept => [kept.n, kept.refusal])).toEqual([[1, null], [2, null]])
  })
})
