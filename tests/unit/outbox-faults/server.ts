/** A model of the server and its database around the real rules: admission, judgement and fold are the program's own. */
import { handBackAfter, planRefusals } from '../../../server/utils/order/for-outage'
import { marginAt } from '../../../server/utils/hold/margin'
import type { PushResult } from '../../../server/utils/record/admit'
import { admit } from '../../../server/utils/record/admit'
import type { Answered } from '../../../server/utils/record/known'
import type { AnyEntry, StoredEntry } from '../../../shared/record/entry'
import { entryHash, isoTime } from '../../../shared/record/entry'
import { applyStored } from '../../../shared/record/fold'
import { judge } from '../../../shared/record/rules'
import type { OutageState } from '../../../shared/record/state'
import type { TestSigner } from '../../support/record'
import { RecordWriter, technician } from '../../support/record'
import { BEGAN, opening } from '../record/store'
import type { Scheduler } from './scheduler'

export const OUTAGES = ['Quarry Street', 'Mill Lane', 'Abbot Green'].map((name) => {
  const writer = new RecordWriter(name, BEGAN)
  writer.sign(technician, 'outage-opened', opening())
  return writer
})

export interface Answer { status: number, results?: PushResult[] }
interface Committed { state: OutageState, log: StoredEntry[], answers: Map<string, Answered> }
export type Signer = TestSigner & { role: 'technician' | 'supervisor' }

const AROUND = { planRefusals, handBackAfter, margin: marginAt, filesAwaited: () => [], root: null }
/** What an older server says of the kinds in which these words stand. */
export const NEWER = 'newer kind'

export class Server {
  /** what the database holds, by outage: all that outlives a killed process */
  readonly committed: Map<string, Committed>
  readonly revoked = new Map<string, number>()
  now = BEGAN + 3_600_000
  old = false
  private lives = 0
  private readonly locked = new Map<string, Promise<void>>()

  constructor(private readonly world: Scheduler, private readonly signers: readonly Signer[]) {
    this.committed = new Map(OUTAGES.map(({ id, state, entries }) => [id, { state: structuredClone(state), log: [...entries], answers: new Map() }]))
    this.old = world.chance(0.2)
  }

  /** kill -9: whoever is being answered never is, and what is not committed never was. */
  kill(): void { this.lives++ }

  /** Once revoked a device stays so, from the first time on. */
  revoke(device: string): void { if (!this.revoked.has(device)) this.revoked.set(device, this.now) }

  /** @param session who is signed in, as the request says it @returns null: no answer will ever come */
  async push(session: string | null, outage: string, items: { entry: AnyEntry, signature: string }[]): Promise<Answer | null> {
    const life = this.lives
    const before = this.locked.get(outage)
    let unlock = () => {}
    const turn = new Promise<void>((resolve) => { unlock = resolve })
    this.locked.set(outage, Promise.all([before, turn]).then(() => undefined))
    try {
      await before
      await this.world.step()
      if (life !== this.lives) return null
      if (session === null) return { status: 401 }
      const draft = this.take(session, outage, items)
      await this.world.step()
      if (life !== this.lives) return null
      if (this.world.fault(0.06)) return { status: this.world.of([500, 500, 503]) } // the database went before it committed
      this.committed.set(outage, draft.committed)
      if (this.world.fault(0.06)) return { status: this.world.of([500, 503]) } // it committed, and went before it said so
      unlock()
      await this.world.step()
      return life === this.lives ? { status: 200, results: draft.results } : null
    } finally {
      unlock()
    }
  }

  /** What a push would make of the database, as appendEntries does under the row's lock. */
  private take(session: string, outage: string, items: { entry: AnyEntry, signature: string }[]): { committed: Committed, results: PushResult[] } {
    const held = this.committed.get(outage)!
    // What these deeds never change is not copied.
    const { snapshot, plan } = held.state
    const state: OutageState = { ...structuredClone({ ...held.state, snapshot: null, plan: null }), snapshot, plan }
    const committed: Committed = { state, log: [...held.log], answers: new Map(held.answers) }
    const own = this.signers.filter(signer => signer.id === session)
    const role = own[0]!.role
    const person = { id: session, name: own[0]!.name, email: '', role, mustChangePassword: false }
    const devices = new Map(own.map(({ device, publicKey }) => {
      const revoked = this.revoked.get(device)
      return [device, { publicKey, revokedAt: revoked === undefined ? null : new Date(revoked) }]
    }))
    const results = items.map((item, index): PushResult => {
      const { entry, signature } = item
      if (this.old && !committed.answers.has(entry.id) && JSON.stringify(entry.body).includes(NEWER)) return { id: entry.id, status: 'refused', code: 422, field: null, reason: 'not known yet', recorded: false, later: 'version' }
      const admitted = admit({ devices, answers: committed.answers }, person, state, item, `entries[${index}]`)
      if ('done' in admitted) return admitted.done
      const judged = 'faulty' in admitted ? null : judge(state, entry, person, AROUND)
      let result: PushResult
      if ('faulty' in admitted || judged?.standing === 'refused') {
        // The server's own entry that names the refusal keeps the device's chain whole.
        result = 'faulty' in admitted ? admitted.refusal : { id: entry.id, status: 'refused', code: 403, field: null, reason: judged!.why.join('; '), recorded: true }
        state.chain[entry.device] = { n: entry.n, hash: entryHash(entry) }
      } else {
        const doubts = admitted.doubt === null ? judged!.why : [admitted.doubt, ...judged!.why]
        const stored: StoredEntry = { entry, signature, seq: state.size + 1, receivedAt: isoTime(this.now), standing: doubts.length > 0 ? 'questioned' : 'accepted', why: doubts }
        applyStored(state, stored)
        committed.log.push(stored)
        result = { id: entry.id, status: stored.standing, seq: stored.seq, receivedAt: stored.receivedAt, why: stored.why }
      }
      committed.answers.set(entry.id, { outage, hash: entryHash(entry), result: result.status === 'refused' ? { ...result, field: null } : result })
      return result
    })
    return { committed, results }
  }
}
