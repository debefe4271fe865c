/** A signing device as a browser has one: its own key, its own count in each outage, no code shared with the server but canonical JSON. */
import { createHash, generateKeyPairSync, sign } from 'node:crypto'
import type { KeyObject } from 'node:crypto'
import { canonicalText } from '../../shared/record/canonical'
import type { Checkpoint } from '../../shared/record/checkpoint'
import type { BodyInput, EntryKind } from '../../shared/record/kinds'
import { newestVersion, schemaOf } from '../../shared/record/kinds'
import { uuidv7 } from '../../shared/record/uuid'
import type { PushResult } from '../../server/utils/record/admit'
import type { Client } from './client'
import { OWN_PASSWORD } from './people'

export interface Envelope { v: number, id: string, outage: string, kind: string, body: unknown, at: string, skew: number, by: string, device: string, n: number, prev: string | null }
export interface Signed { entry: Envelope, signature: string }
export interface PushAnswer { results: PushResult[], size: number, phase: string, code: string | null, checkpoint: Checkpoint | null, data?: { field: string | null, reason: string } }

export class Phone {
  readonly id = uuidv7(Date.now())
  readonly publicKey: string
  private readonly key: KeyObject
  private readonly chains = new Map<string, { n: number, hash: string }>()

  /** @param person the id of its owner @param now the server's clock, Unix ms */
  constructor(readonly client: Client, readonly person: string, private readonly now: () => number) {
    const { privateKey, publicKey } = generateKeyPairSync('ed25519')
    this.key = privateKey
    this.publicKey = publicKey.export({ format: 'jwk' }).x!
  }

  async enrol(password = OWN_PASSWORD): Promise<this> {
    const { status, body } = await this.client.send('POST', '/api/devices', { id: this.id, name: 'Phone', publicKey: this.publicKey, password })
    if (status !== 201) throw new Error(`The device was not enrolled: ${status} ${JSON.stringify(body)}`)
    return this
  }

  /** Signs what an entry says, whatever it says. */
  seal(entry: Envelope): Signed {
    return { entry, signature: sign(null, Buffer.from(canonicalText(entry)), this.key).toString('base64url') }
  }

  /** The next entry of this device in an outage, with a body as it is given. @param change what is to be wrong with it */
  raw(outage: string, kind: string, body: unknown, change: Partial<Envelope> = {}): Signed {
    const chain = this.chains.get(outage)
    const entry = { v: 1, id: uuidv7(this.now()), outage, kind, body, at: new Date(this.now()).toISOString(), skew: 0, by: this.person, device: this.id, n: (chain?.n ?? 0) + 1, prev: chain?.hash ?? null, ...change }
    const signed = this.seal(entry)
    this.chains.set(outage, { n: entry.n, hash: createHash('sha256').update(canonicalText(entry)).digest('hex') })
    return signed
  }

  /** The next entry of this device in an outage. */
  write<K extends EntryKind>(outage: string, kind: K, body: BodyInput<K>, change: Partial<Envelope> = {}): Signed {
    return this.raw(outage, kind, schemaOf(kind, newestVersion(kind))!.parse(body), { v: newestVersion(kind), ...change })
  }

  /** Forgets the last entry of an outage, as a device does whose entry was refused without taking its place. */
  unwrite(outage: string, signed: Signed): void {
    if (signed.entry.prev === null) this.chains.delete(outage)
    else this.chains.set(outage, { n: signed.entry.n - 1, hash: signed.entry.prev })
  }

  push(outage: string, entries: unknown[]): Promise<{ status: number, body: PushAnswer }> {
    return this.client.send<PushAnswer>('POST', `/api/outages/${outage}/entries`, { entries })
  }

  /** Signs and sends one entry. */
  async act<K extends EntryKind>(outage: string, kind: K, body: BodyInput<K>): Promise<{ status: number, result: PushResult, answer: PushAnswer, signed: Signed }> {
    const signed = this.write(outage, kind, body)
    const { status, body: answer } = await this.push(outage, [signed])
    return { status, result: answer.results[0]!, answer, signed }
  }
}
