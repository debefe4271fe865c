// Source of the limits: FDA Food Code 2022, 3-501.16 and 3-501.19 (cold holding at 41 °F; time as a public health control).
import { describe, expect, it } from 'vitest'
import type { OutboxEntry } from '~/offline/outbox-ports'
import { placeOfKept } from '~/utils/entry-places'
import { stateHere } from '~/utils/state-here'
import { SURROUNDINGS } from '~/composables/useOutage'
import { isoTime } from '~~/shared/record/entry'
import type { AnyEntry } from '~~/shared/record/entry'
import { uuidv7 } from '~~/shared/record/uuid'
import { technician } from '../../support/record'
import { DAIRY, reading, storyTo } from '../record/store'

const HOUR = 3_600_000
const person = { id: technician.id, role: 'technician' as const }

function kept(kind: AnyEntry['kind'], body: object, at: number, place = 1): OutboxEntry {
  const entry = { v: 1, id: uuidv7(at), outage: uuidv7(1), kind, body, at: isoTime(at), skew: 0, by: technician.id, device: technician.device, n: 100 + place, prev: 'a'.repeat(64) } as AnyEntry
  return { id: entry.id, outage: entry.outage, person: technician.id, device: technician.device, n: entry.n, entry, signature: 'x'.repeat(86), keptAt: entry.at, place, receipt: null, refusal: null }
}
const warm = (at: number, value: number, place = 1) => kept('reading-taken', { ...reading(DAIRY, value), words: '', photos: [] }, at, place)

describe('stateHere', () => {
  const { state: base, now } = storyTo('dark')
  const before = structuredClone(base)

  it('is the log itself where nothing is ahead of it', () => {
    expect(stateHere(base, [], person, SURROUNDINGS, null).state).toBe(base)
  })

  it('judges a reading by the rulebook before the server does, and says so', () => {
    const { state, checkedHere } = stateHere(base, [warm(now + 60_000, 45)], person, SURROUNDINGS, null)
    expect(state.cases[DAIRY]!.verdict?.verdict).toBe('above')
    expect([...checkedHere]).toEqual([DAIRY])
    expect(base).toEqual(before)
  })

  it('lets a verdict get worse with the time while the server is away', () => {
    const own = [warm(now + 60_000, 45), warm(now + 2 * HOUR, 46, 2), warm(now + 4.5 * HOUR, 48, 3)]
    const { state } = stateHere(base, own, person, SURROUNDINGS, now + 5 * HOUR)
    expect(['act', 'discard']).toContain(state.cases[DAIRY]!.verdict?.verdict)
    expect(state.cases[DAIRY]!.openAct).not.toBeNull()
  })

  it('questions on the phone what the server will question', () => {
    const { state } = stateHere(base, [kept('plan-submitted', { note: '' }, now)], person, SURROUNDINGS, null)
    expect(state.questioned.map(item => item.kind)).toEqual(['plan-submitted'])
  })

  it('shows an entry with a receipt until the log holds it, and never twice', () => {
    const held = { ...warm(now + 60_000, 39), receipt: { status: 'accepted' as const, seq: base.size + 1, receivedAt: isoTime(now), why: [] } }
    const readings = (size: number) => stateHere({ ...base, size }, [held], person, SURROUNDINGS, null).state.cases[DAIRY]!.readings.length
    expect([readings(base.size), readings(base.size + 1)]).toEqual([base.cases[DAIRY]!.readings.length + 1, base.cases[DAIRY]!.readings.length])
  })
})

describe('placeOfKept', () => {
  const receipt = { status: 'questioned' as const, seq: 7, receivedAt: '', why: [] }
  it('tells one of five', () => {
    expect(placeOfKept({ receipt: null, refusal: null }, 9)).toBe('kept')
    expect(placeOfKept({ receipt, refusal: null }, 6)).toBe('sent')
    expect(placeOfKept({ receipt, refusal: null }, 7)).toBe('questioned')
    expect(placeOfKept({ receipt: { ...receipt, status: 'accepted' }, refusal: null }, 7)).toBe('record')
    expect(placeOfKept({ receipt: null, refusal: { code: 422, field: null, reason: 'no', recorded: true } }, 9)).toBe('refused')
  })
})
