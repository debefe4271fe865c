/** A model of one browser: a store that all its tabs share, a session for all of them, and tabs that can die at any await. */
import { tabLocks } from '../../../app/offline/outbox'
import type { Locks, OutboxEntry, OutboxPorts, OutboxStore, Send } from '../../../app/offline/outbox-ports'
import { Unsent } from '../../../app/offline/outbox-ports'
import { troubleOf } from '../../../app/queries/entries'
import { uuidFor } from '../../support/record'
import type { MemoryStore } from '../../support/outbox'
import { memoryStore } from '../../support/outbox'
import type { Scheduler } from './scheduler'
import type { Server, Signer } from './server'

export type LockKind = 'shared' | 'tab' | 'none'

export class Phone {
  readonly store: MemoryStore = memoryStore()
  /** whose session the browser's cookie is */
  session: string | null
  clock: number
  online = true
  /** storage: writes fail */
  full = false
  ids = 0
  /** every entry that was ever on the disk, by id */
  readonly everKept = new Map<string, OutboxEntry>()
  private readonly queues = new Map<string, { tab: object, go: () => void }[]>()

  constructor(readonly name: string, readonly world: Scheduler, readonly server: Server, readonly signers: readonly Signer[], readonly lockKind: LockKind) {
    this.session = signers[0]!.id
    this.clock = server.now
  }

  /** The ports of a new tab. @param alive an object whose `dead` is set when the tab dies: none of its awaits then ever ends */
  ports(tab: { dead: boolean }): OutboxPorts {
    return {
      store: this.storeOf(tab), send: this.sendOf(tab), locks: this.locksOf(tab), now: () => this.clock,
      newId: now => uuidFor(`${this.name} ${++this.ids}`, now),
    }
  }

  /** A death in mid-turn frees what the tab held, as browsers do. */
  died(tab: object): void {
    for (const [name, queue] of this.queues) {
      const held = queue[0]?.tab === tab
      const left = queue.filter(item => item.tab !== tab)
      this.queues.set(name, left)
      if (held) left[0]?.go()
    }
  }

  private async step(tab: { dead: boolean }): Promise<void> {
    await this.world.step()
    if (tab.dead) await new Promise(() => {})
  }

  private storeOf(tab: { dead: boolean }): OutboxStore {
    const guarded = <A extends unknown[], R>(method: (...given: A) => Promise<R>, writes: boolean) => async (...given: A): Promise<R> => {
      await this.step(tab)
      if (writes && ((this.full && this.world.hostile) || this.world.fault(0.04))) throw new DOMException('no room', this.world.of(['QuotaExceededError', 'AbortError']))
      const result = await method(...given)
      await this.step(tab)
      return result
    }
    const keep: OutboxStore['keep'] = async (entry, from, end) => {
      const place = await this.store.keep(entry, from, end)
      if (place !== null) this.everKept.set(entry.id, { ...entry, place })
      return place
    }
    const { entries, chain, settle, dismiss, collect } = this.store
    return { entries: guarded(entries, false), chain: guarded(chain, false), keep: guarded(keep, true), settle: guarded(settle, true), dismiss: guarded(dismiss, true), collect: guarded(collect, true) }
  }

  private sendOf(tab: { dead: boolean }): Send {
    return async (outage, items) => {
      await this.step(tab)
      if ((!this.online && this.world.hostile) || this.world.fault(0.08)) throw new Unsent('away')
      const session = this.session
      const deliver = async () => {
        await this.world.step()
        return this.world.fault(0.08) ? null : this.server.push(session, outage, structuredClone(items))
      }
      const delivered = deliver()
      if (this.world.fault(0.1)) void deliver() // the network doubles it; this copy's answer reaches nobody
      if (this.world.fault(0.1)) { // given up while it is still on its way
        await this.step(tab)
        throw new Unsent('away')
      }
      const answer = await delivered
      await this.step(tab)
      if (answer === null || this.world.fault(0.1)) throw new Unsent('away')
      if (!answer.results) throw new Unsent(troubleOf(answer.status))
      if (this.world.fault(0.05)) return answer.results.slice(0, this.world.below(answer.results.length))
      return this.world.fault(0.05) ? [...answer.results].reverse() : answer.results
    }
  }

  private locksOf(tab: { dead: boolean }): Locks {
    if (this.lockKind === 'none') return { run: (_name, task) => task() }
    if (this.lockKind === 'tab') return tabLocks()
    return { run: async (name, task) => {
      const queue = this.queues.get(name) ?? []
      this.queues.set(name, queue)
      await new Promise<void>((resolve) => {
        queue.push({ tab, go: resolve })
        if (queue.length === 1) resolve()
      })
      try {
        return await task()
      } finally {
        const now = this.queues.get(name)!
        now.shift()
        now[0]?.go()
      }
    } }
  }
}
