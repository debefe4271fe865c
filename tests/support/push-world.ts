/** The demo's Quarry Street with many outages and many devices, whose owners sign notes. */
import { generateKeyPairSync } from 'node:crypto'
import type { KeyObject } from 'node:crypto'
import { eq } from 'drizzle-orm'
import type { entries } from '~~/server/database/schema'
import { devices, outages as outagesTable } from '~~/server/database/schema'
import { equipmentOf } from '~~/server/database/seed/chapters'
import { seedPeople } from '~~/server/database/seed/people'
import { seedSites } from '~~/server/database/seed/sites'
import { workOf } from '~~/server/database/seed/work'
import type { Person } from '~~/server/utils/access'
import type { Database } from '~~/server/utils/database'
import { proposePlan } from '~~/server/utils/order/propose-plan'
import { appendEntries } from '~~/server/utils/record/append'
import { publicKeyText, signBytes } from '~~/server/utils/record/keys'
import { canonicalText, sha256Hex } from '~~/shared/record/canonical'
import type { AnyEntry, SignedEntry } from '~~/shared/record/entry'
import { entryBytes, entryHash, isoTime } from '~~/shared/record/entry'
import type { BodyInput, EntryKind } from '~~/shared/record/kinds'
import { newestVersion, schemaOf } from '~~/shared/record/kinds'
import { uuidv7 } from '~~/shared/record/uuid'

const WORDS = 'Night covers are down on the dairy wall, and the doors of the walk-in stay shut.'
/** Rows of bare inserts count on from here, out of the way of the log. */
const BESIDE = 500_000

export class Device {
  readonly id: string
  private readonly chains = new Map<string, { n: number, hash: string }>()
  private bare = BESIDE

  constructor(readonly person: Person, private readonly key: KeyObject, private readonly now: number, private readonly place: number) { this.id = uuidv7(now) }

  get publicKey(): string { return publicKeyText(this.key) }

  /** The next entry of this device in an outage. */
  write<K extends EntryKind>(outage: string, kind: K, input: BodyInput<K>, id = uuidv7(this.now)): SignedEntry {
    const v = newestVersion(kind)
    const chain = this.chains.get(outage)
    const entry = { v, id, outage, kind, body: schemaOf(kind, v)!.parse(input), at: isoTime(this.now), skew: 0, by: this.person.id, device: this.id, n: (chain?.n ?? 0) + 1, prev: chain?.hash ?? null } as unknown as AnyEntry
    this.chains.set(outage, { n: entry.n, hash: entryHash(entry) })
    return { entry, signature: signBytes(entryBytes(entry), this.key) }
  }

  /** The next notes of this device in an outage, as its outbox would send them. */
  sign(outage: string, count: number): SignedEntry[] {
    return Array.from({ length: count }, () => this.write(outage, 'note-added', { words: WORDS }))
  }

  /** A row like those that a push stores, with a place of its own. */
  row(outage: string): typeof entries.$inferInsert {
    const n = ++this.bare
    const [{ entry, signature }] = [new Device(this.person, this.key, this.now, 0).sign(outage, 1)[0]!]
    const signed = canonicalText({ ...entry, device: this.id })
    const checkpoint = { statement: { type: 'holdover-checkpoint' as const, version: 1 as const, outage, size: n, root: sha256Hex(signed), time: isoTime(this.now), key: this.id }, signature }
    return { outageId: outage, seq: n + this.place * BESIDE, id: entry.id, kind: entry.kind, personId: this.person.id, deviceId: this.id, n, hash: sha256Hex(signed), signed, signature, receivedAt: new Date(this.now), standing: 'accepted', why: [], checkpoint }
  }
}

export interface PushWorld { now: number, devices: Device[], outages: string[], /** for bare inserts: an outage beside each, with no log to spoil */ beside: Map<string, string> }

/** Seeds an empty database. */
export async function pushWorld(db: Database, deviceCount: number, outageCount: number): Promise<PushWorld> {
  const now = Date.now()
  const equipment = await seedSites(db, now)
  const cast = await seedPeople(db, equipment.sites, now)
  const { person } = cast.technician
  const made = Array.from({ length: deviceCount }, (_, place) => new Device(person, generateKeyPairSync('ed25519').privateKey, now, place + 1))
  await db.insert(devices).values(made.map(device => ({ id: device.id, personId: person.id, name: 'Phone', publicKey: device.publicKey, enrolledAt: new Date(now) })))
  const snapshot = await equipmentOf({ db, equipment, cast, now, storage: undefined as never }, 'Quarry Street')
  const plan = proposePlan(snapshot, workOf(equipment, 'Software update'), isoTime(now + 3_600_000))
  const outages = Array.from({ length: outageCount }, () => uuidv7(now))
  for (const outage of outages) {
    const { results: [result] } = await appendEntries(db, person, outage, [made[0]!.write(outage, 'outage-opened', { planned: true, lostAt: null, cause: '', snapshot, plan })], now)
    if (result?.status !== 'accepted') throw new Error(JSON.stringify(result))
  }
  const beside = new Map<string, string>()
  for (const outage of outages) {
    const [row] = await db.select().from(outagesTable).where(eq(outagesTable.id, outage))
    const id = uuidv7(now)
    beside.set(outage, id)
    await db.insert(outagesTable).values({ ...row!, id, code: id })
  }
  return { now, devices: made, outages, beside }
}
