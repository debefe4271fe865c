import type { KeyObject } from 'node:crypto'
import type { AnyEntry, SignedEntry, Standing } from '../../../shared/record/entry'
import { ENTRIES_PER_PUSH, entryBytes, entryHash, isoTime } from '../../../shared/record/entry'
import { applyStored } from '../../../shared/record/fold'
import type { BodyInput, BodyOf, EntryKind } from '../../../shared/record/kinds'
import { newestVersion, schemaOf } from '../../../shared/record/kinds'
import type { OutageState } from '../../../shared/record/state'
import { emptyState } from '../../../shared/record/state'
import { uuidv7 } from '../../../shared/record/uuid'
import type { Person } from '../../utils/access'
import type { Database } from '../../utils/database'
import { appendEntries } from '../../utils/record/append'
import { signBytes } from '../../utils/record/keys'
import { readEntries } from '../../utils/record/log'

const MINUTE = 60_000

/** A person with a device that they sign on. `skew`: how far its clock is ahead of the server's, ms */
export interface Teller { person: Person, device: string, key: KeyObject, skew: number }

interface Signed { teller: Teller, item: SignedEntry, expect: Standing }

/**
 * One outage as it is told: entries are signed at the story's clock, wait as in an outbox, and go
 * through the very function that takes what phones send. What turns out other than the story
 * expects is an error, so that the demo cannot rot in silence.
 */
export class Story {
  readonly id: string
  /** the server's clock, Unix ms */
  now: number
  /** the fold of what the server held after the last sending */
  readonly state: OutageState
  private outbox: Signed[] = []
  private readonly chains = new Map<string, { n: number, hash: string }>()

  /** @param begins Unix ms */
  constructor(readonly db: Database, begins: number) {
    this.id = uuidv7(begins)
    this.now = begins
    this.state = emptyState(this.id)
  }

  /** Lets time go by. */
  pass(minutes: number): this {
    this.now += Math.round(minutes * MINUTE)
    return this
  }

  /** Moves on to a moment. @throws Error where that would be back in time */
  goTo(moment: number): this {
    if (moment < this.now) throw new Error(`The story is at ${isoTime(this.now)} and cannot go back to ${isoTime(moment)}`)
    this.now = Math.round(moment)
    return this
  }

  /** A moment as the teller's device shows it, for times inside a body. */
  told(teller: Teller, moment = this.now): string {
    return isoTime(moment + teller.skew)
  }

  /** Signs an entry now; it is sent with the next `send`. Gives its id. */
  sign<K extends EntryKind>(teller: Teller, kind: K, body: BodyInput<K>, expect: Standing = 'accepted'): string {
    const v = newestVersion(kind)
    const chain = this.chains.get(teller.device)
    const entry = {
      v, id: uuidv7(this.now), outage: this.id, kind, body: schemaOf(kind, v)!.parse(body) as BodyOf<K>,
      at: this.told(teller), skew: teller.skew, by: teller.person.id, device: teller.device, n: (chain?.n ?? 0) + 1, prev: chain?.hash ?? null,
    } as unknown as AnyEntry
    this.chains.set(teller.device, { n: entry.n, hash: entryHash(entry) })
    this.outbox.push({ teller, item: { entry, signature: signBytes(entryBytes(entry), teller.key) }, expect })
    return entry.id
  }

  /** Sends what was signed, at the story's clock. @throws Error naming the entry that came out otherwise */
  async send(): Promise<void> {
    const waiting = this.outbox
    this.outbox = []
    while (waiting.length > 0) {
      const { person } = waiting[0]!.teller
      const other = waiting.findIndex(signed => signed.teller.person !== person)
      await this.push(person, waiting.splice(0, Math.min(ENTRIES_PER_PUSH, other === -1 ? waiting.length : other)))
    }
    for (const stored of await readEntries(this.db, this.id, this.state.size)) applyStored(this.state, stored)
  }

  private async push(person: Person, sent: Signed[]): Promise<void> {
    const { results } = await appendEntries(this.db, person, this.id, sent.map(signed => signed.item), this.now)
    for (const [index, { item: { entry }, expect }] of sent.entries()) {
      const result = results[index]!
      if (result.status === expect) continue
      const why = result.status === 'refused' ? result.reason : result.why.join('; ')
      throw new Error(`The demo expects "${entry.kind}" of ${entry.at} to be ${expect}, but it is ${result.status}${why ? `: ${why}` : ''}`)
    }
  }
}
