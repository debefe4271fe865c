/** One history of phones, people, faults and a server, from a seed, and what is wrong with how it ended. */
import { createOutbox, Unsent } from '../../../app/offline/outbox'
import type { Outbox } from '../../../app/offline/outbox'
import type { ChainEnd, OutboxPorts } from '../../../app/offline/outbox-ports'
import { testSigner } from '../../support/record'
import { judgeEnd } from './end'
import { Phone } from './phone'
import type { LockKind } from './phone'
import { Scheduler } from './scheduler'
import type { Signer } from './server'
import { NEWER, OUTAGES, Server } from './server'

/** What somebody meant to sign; its words are in the body and occur once. */
export interface Deed { words: string, by: string, device: string, outage: string, /** it is wrong in itself, and why */ bad: 'body' | 'signature' | 'role' | null, /** refusals that were on the phone when it was signed, or seen and gone, by id */ after: Set<string> }
/** What a screen called kept on this phone. */
export interface Shown { id: string, phone: Phone, deed: Deed, place: number, n: number }

export interface Told { deeds: Deed[], shown: Shown[], /** refusals that their signer saw before they went, by id */ seen: Set<string>, phones: Phone[], server: Server, world: Scheduler }
/** Changes an outbox for the worse. */
export type Break = (phone: Phone, ports: OutboxPorts) => OutboxPorts

interface Tab { phone: Phone, life: { dead: boolean }, outbox: Outbox, /** whom its screens take to be signed in */ person: string }

const named = (name: string, device: string) => testSigner(name, 'technician', device) as Signer
const TESS_HERE = named('Tess Harrow', 'Phone')
const RAY_HERE = named('Ray Pell', 'Phone')
const TESS_THERE = named('Tess Harrow', 'Other phone')
const SAM_THERE = named('Sam Orly', 'Other phone')
const SIGNERS = [TESS_HERE, RAY_HERE, TESS_THERE, SAM_THERE]
const DAY = 86_400_000

/** Tells a history and judges its end. @returns what is wrong with it; empty: nothing */
export async function history(seed: number, breaks: Break = (_phone, ports) => ports): Promise<string[]> {
  const world = new Scheduler(seed)
  const server = new Server(world, SIGNERS)
  const locks = world.of<LockKind>(['shared', 'shared', 'tab', 'none'])
  const phones = [new Phone('one', world, server, [TESS_HERE, RAY_HERE], locks), new Phone('two', world, server, [TESS_THERE, SAM_THERE], locks)]
  const told: Told = { deeds: [], shown: [], seen: new Set(), phones, server, world }
  const open = (phone: Phone): Tab => {
    const life = { dead: false }
    return { phone, life, outbox: createOutbox(breaks(phone, phone.ports(life))), person: phone.session ?? phone.signers[0]!.id }
  }
  const tabs = phones.flatMap(phone => [open(phone), open(phone)])
  for (let acts = 20 + world.below(40); acts > 0;) {
    if (world.chance(0.75)) { await world.turn(); continue }
    acts--
    act(told, tabs, open)
    await world.turn()
  }
  await heal(told, open)
  return judgeEnd(told)
}

/** Something that people, phones or the world do. */
function act(told: Told, tabs: Tab[], open: (phone: Phone) => Tab): void {
  const { world, server } = told
  const index = world.below(tabs.length)
  const tab = tabs[index]!
  const { phone } = tab
  const what = world.below(24)
  if (what < 8) return sign(told, tab)
  if (what < 13) return quietly(world.chance(0.3) ? tab.outbox.drain(world.of(OUTAGES).id, tab.person) : tab.outbox.drainAll(tab.person))
  switch (what) {
    case 13: tab.life.dead = true; phone.died(tab.life); tabs[index] = open(phone); break
    case 14: server.kill(); break
    case 15: phone.session = world.of(phone.signers).id; tab.person = phone.session; break
    case 16: if (world.chance(0.5)) phone.session = null; break
    case 17: for (const any of told.phones) any.session ??= any.signers[0]!.id; break
    case 18: phone.clock += world.of([-DAY, DAY]); break
    case 19: phone.online = world.chance(0.7); break
    case 20: phone.full = world.chance(0.3); break
    case 21: if (world.chance(0.15)) server.revoke(world.of(SIGNERS).device); break
    case 22: server.old = false; break
    default: look(told, tab)
  }
  phone.clock += 60_000
  server.now += 60_000
}

function sign(told: Told, { phone, outbox, person }: Tab): void {
  const { world, deeds, shown } = told
  const signer = phone.signers.find(known => known.id === person)!
  const outage = OUTAGES[world.chance(0.7) ? 0 : 1]!.id
  const bad = world.chance(0.15) ? world.of(['body', 'signature', 'signature', 'role'] as const) : null
  const words = `deed ${deeds.length + 1}${bad === 'body' ? '\0' : ''}${world.chance(0.05) ? ` ${NEWER}` : ''}`
  const after = new Set([...told.seen, ...[...phone.store.held.values()].filter(kept => kept.refusal).map(kept => kept.id)])
  const deed: Deed = { words, by: signer.id, device: signer.device, outage, bad, after }
  deeds.push(deed)
  const signing = { person: signer.id, device: signer.device, sign: async (bytes: Uint8Array) => bad === 'signature' ? 'A'.repeat(86) : signer.sign(bytes) }
  const known = world.chance(0.3) ? chainOf(told, signer.device, outage) : null
  const kept = bad === 'role'
    ? outbox.keep(signing, outage, 'plan-approved', { note: words }, 0, known)
    : world.chance(0.2)
      ? outbox.keep(signing, outage, 'step-ticked', { step: 'load', state: 'begun', words }, 0, known)
      : outbox.keep(signing, outage, 'note-added', { words }, 0, known)
  quietly(kept.then(({ id, place, n }) => void shown.push({ id, phone, deed, place, n })))
}

/** A screen pulls the log, lets go what it holds, and its reader sees what was refused. */
function look(told: Told, { phone, outbox, person }: Tab): void {
  for (const { id } of OUTAGES) {
    const size = told.server.committed.get(id)!.log.length
    quietly(outbox.collect(id, size))
  }
  for (const kept of phone.store.held.values()) {
    if (kept.person !== person || !kept.refusal) continue
    told.seen.add(kept.id)
    quietly(outbox.dismiss(kept.id))
  }
}

function chainOf({ server }: Told, device: string, outage: string): ChainEnd | null {
  return server.committed.get(outage)!.state.chain[device] ?? null
}

/** The world becomes kind: everybody signs in in turn, and what waits is sent. */
async function heal(told: Told, open: (phone: Phone) => Tab): Promise<void> {
  const { world, phones, server } = told
  await world.rest()
  world.hostile = false
  server.old = false
  await world.rest()
  for (let rounds = 0; rounds < 3; rounds++) {
    for (const phone of phones) {
      for (const { id } of phone.signers) {
        phone.session = id
        const tab = open(phone)
        quietly(tab.outbox.drainAll(id))
        await world.rest()
      }
    }
  }
}

/** A fault that the program shows to its user is no fault of the test's; any other is. */
function quietly(work: Promise<unknown>): void {
  void work.catch((error: unknown) => {
    if (error instanceof DOMException || error instanceof Unsent || (error instanceof Error && /another tab/.test(error.message))) return
    throw error
  })
}
