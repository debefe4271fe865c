/** What every story does alike: checks, points in hand, rounds, points back. Times and figures are invented. */
import { sha256Hex } from '../../../shared/record/canonical'
import type { CheckId } from '../../../shared/record/checks'
import type { BodyOf } from '../../../shared/record/kinds'
import { expectedSeen, inUnit, watchedCases } from '../../../shared/record/select'
import type { Snapshot, SnapshotPoint } from '../../../shared/record/snapshot'
import type { HandPosition } from '../../../shared/schemas/point-kinds'
import { isHandActive } from '../../../shared/schemas/point-kinds'
import { keepFile } from '../../utils/files/keep'
import { snapshotOf } from '../../utils/record/snapshot'
import type { Stage } from './stage'
import type { Hand } from './drawings'
import { drawingOf } from './drawings'
import type { Story, Teller } from './storyteller'
import type { ProductAt } from './warming'

/** So many acts reach the server together: the phone has no signal at every panel. */
const ACTS_PER_SENDING = 5
const SECONDS_PER_CASE = 14

/** The equipment of a site's rack controller as it stands. */
export async function equipmentOf({ db, equipment }: Stage, site: keyof Stage['equipment']['sites']): Promise<Snapshot> {
  const snapshot = await snapshotOf(db, equipment.sites[site].controllers['Rack controller']!)
  if (!snapshot) throw new Error(`The seed has no rack controller at ${site}`)
  return snapshot
}

/** Signs checks one after another, with what was noted of each. */
export async function signChecks(story: Story, teller: Teller, checks: readonly { id: CheckId }[], noted: Partial<Record<CheckId, string>>, minutesEach: number): Promise<void> {
  for (const { id } of checks) story.pass(minutesEach).sign(teller, 'check-signed', { check: id, outcome: 'done', words: noted[id] ?? '' })
  await story.send()
}

/** Ticks a step of the work as begun or done, and sends it at once. @param after minutes since the entry before */
export async function tickStep(story: Story, teller: Teller, step: string, state: 'begun' | 'done', after: number): Promise<void> {
  story.pass(after).sign(teller, 'step-ticked', { step, state })
  await story.send()
}

export interface InHand {
  tags: readonly string[]
  /** by when the points must be off again, Unix ms */
  until: number
  minutesEach: number
}

/** Puts points in hand as the plan says and sees of each what was asked. */
export async function putInHand(story: Story, teller: Teller, { tags, until, minutesEach }: InHand): Promise<void> {
  for (const [index, tag] of tags.entries()) {
    const point = story.state.snapshot.points.find(known => known.tag === tag)!
    const { hand } = story.state.plan.points.find(planned => planned.tag === tag)!
    story.pass(minutesEach).sign(teller, 'point-in-hand', { tag, hand, seen: expectedSeen(point.kind, hand), value: shown(point, hand), until: story.told(teller, until) })
    if (index % ACTS_PER_SENDING === ACTS_PER_SENDING - 1) await story.send()
  }
  await story.send()
}

/** What a clamp meter or a keypad shows of a point in hand. */
function shown({ kind, ratedA, tag }: SnapshotPoint, hand: HandPosition): BodyOf<'point-in-hand'>['value'] {
  if (typeof hand === 'object') return 'hz' in hand ? { number: hand.hz, unit: 'Hz' } : { number: hand.percent, unit: '%' }
  if (ratedA === null || kind === 'liquid-line-valve') return null
  // Machines draw somewhat less than their rating, each a little differently.
  const share = 0.78 + tag.charCodeAt(tag.length - 1) % 7 / 50
  return { number: isHandActive(hand) ? Math.round(ratedA * share * 10) / 10 : 0, unit: 'A' }
}

export interface Round {
  round: number
  product: ProductAt
  instrument: string
  /** suction and discharge of each group, psig */
  pressures: readonly { group: string, suction: number, discharge: number }[]
  /** a reading that is typed wrong at first: for which case, as what, and why */
  slip?: { name: string, typed: number, reason: string }
}

/** One pass over all watched cases with product in them, and over the racks. */
export async function takeRound(story: Story, teller: Teller, { round, product, instrument, pressures, slip }: Round): Promise<void> {
  const { snapshot } = story.state
  const unit = snapshot.site.temperatureUnit
  const watched = new Set(watchedCases(story.state).filter(item => !item.empty).map(item => item.id))
  for (const known of snapshot.cases.filter(item => watched.has(item.id))) {
    story.pass(SECONDS_PER_CASE / 60)
    const value = Math.round(inUnit(product(known, story.now, round), unit) * 10) / 10
    const wrong = slip?.name === known.name
    const reading = story.sign(teller, 'reading-taken', { round, caseId: known.id, value: wrong ? slip.typed : value, unit, method: 'product', instrumentId: instrument })
    if (wrong) story.pass(0.2).sign(teller, 'correction', { corrects: reading, reason: slip.reason, reading: { value } })
  }
  for (const { group, suction, discharge } of pressures) readPressure(story, teller, round, group, suction, discharge)
  await story.send()
}

export function readPressure(story: Story, teller: Teller, round: number, group: string, suctionPsig: number, dischargePsig: number): void {
  story.pass(0.3).sign(teller, 'pressure-read', { round, suctionGroupId: group, suctionPsig, dischargePsig })
}

/** Gives points back to the controller; those not called for wait for their proof. */
export async function returnPoints(story: Story, teller: Teller, tags: readonly string[], minutesEach: number, notCalled: readonly string[] = []): Promise<void> {
  for (const [index, tag] of tags.entries()) {
    story.pass(minutesEach).sign(teller, 'point-in-auto', { tag, seen: notCalled.includes(tag) ? 'not-called' : 'answers' })
    if (index % ACTS_PER_SENDING === ACTS_PER_SENDING - 1) await story.send()
  }
  await story.send()
}

/** Draws a signature and leaves it with the outage, as a phone does. Gives its SHA-256. */
export async function draw(story: Story, { storage }: Stage, teller: Teller, hand: Hand): Promise<string> {
  const bytes = await drawingOf(hand)
  const sha256 = sha256Hex(bytes)
  await keepFile(story.db, storage, { outageId: story.id, personId: teller.person.id, sha256, bytes })
  return sha256
}
