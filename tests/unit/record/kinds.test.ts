/** Schemas of every kind of entry; common practice of the project, no published source. */
import { describe, expect, it } from 'vitest'
import { canonicalText } from '../../../shared/record/canonical'
import { envelopeSchema, pushSchema, signedEntrySchema, SERVER } from '../../../shared/record/entry'
import type { EntryKind } from '../../../shared/record/kinds'
import { isEntryKind, isServerKind, KINDS, newestVersion, schemaOf } from '../../../shared/record/kinds'
import { technician, uuidFor } from '../../support/record'
import { BODIES } from './bodies'
import { DAIRY, opening, reading, storyTo } from './store'

const kinds = Object.keys(KINDS) as EntryKind[]
const bodies = kinds.map(kind => [kind, BODIES[kind]] as const)

/** The path and message of the first fault, or null. */
function fault(kind: EntryKind, body: unknown): string | null {
  const parsed = schemaOf(kind, newestVersion(kind))!.safeParse(body)
  return parsed.success ? null : `${parsed.error.issues[0]!.path.join('.')}: ${parsed.error.issues[0]!.message}`
}

describe.each(bodies)('%s', (kind, body) => {
  const schema = schemaOf(kind, newestVersion(kind))!

  it('comes back from its JSON as it was written', () => {
    const written = schema.parse(body)
    expect(canonicalText(schema.parse(JSON.parse(JSON.stringify(written))))).toBe(canonicalText(written))
    expect(written).toMatchObject(body as object)
  })

  it('takes no field that it does not know', () => {
    expect(fault(kind, { ...(body as object), surprise: 1 })).toContain('surprise')
  })

  it('misses each field that it needs', () => {
    const needed = Object.keys(body as object).filter(field => fault(kind, Object.fromEntries(Object.entries(body as object).filter(([name]) => name !== field))) !== null)
    const optional = Object.keys(body as object).filter(field => !needed.includes(field))
    expect(optional.filter(field => !['words', 'photos', 'note', 'reason', 'cause', 'product', 'unit', 'place', 'coolBy', 'takenBy', 'left'].includes(field))).toEqual([])
    for (const field of needed) expect(fault(kind, { ...(body as object), [field]: undefined })).toContain(field)
  })

  it('is no array, text or nothing', () => {
    for (const other of [[], 'x', null, undefined, 3]) expect(fault(kind, other)).not.toBeNull()
  })
})

describe('fields', () => {
  it.each<[string, EntryKind, object, string]>([
    ['a blank reason', 'called-off', { reason: '   ' }, 'reason: Say why'],
    ['words that are too long', 'note-added', { words: 'x'.repeat(2001), photos: [] }, 'words: At most 2000 characters'],
    ['a date that no calendar has', 'went-dark', { lostAt: '2026-02-30T00:00:00.000Z' }, 'lostAt: This is not a time'],
    ['an hour that no day has', 'went-dark', { lostAt: '2026-02-03T24:00:00.000Z' }, 'lostAt: This is not a time'],
    ['a time without milliseconds', 'went-dark', { lostAt: '2026-02-03T10:00:00Z' }, 'lostAt: A time is UTC'],
    ['a time with an offset', 'went-dark', { lostAt: '2026-02-03T10:00:00.000+01:00' }, 'lostAt: A time is UTC'],
    ['a year that no database keeps', 'went-dark', { lostAt: '0000-01-01T00:00:00.000Z' }, 'lostAt: A time is UTC'],
    ['a tag that every object has', 'point-proven', { tag: 'constructor', words: '', photos: [] }, 'tag: This cannot be a tag'],
    ['a tag that is the prototype', 'point-proven', { tag: '__proto__', words: '', photos: [] }, 'tag: This cannot be a tag'],
    ['a reading over the scale in °C', 'reading-taken', { ...reading(DAIRY, 81), unit: 'C' }, 'value: Between -60 and 80 °C'],
    ['a reading under the scale in °F', 'reading-taken', reading(DAIRY, -77), 'value: At least -76'],
    ['a reading that is no number', 'reading-taken', { ...reading(DAIRY, 0), value: '38' }, 'value: Enter a number'],
    ['a reading without an end', 'reading-taken', { ...reading(DAIRY, 0), value: Infinity }, 'value'],
    ['a round that is no whole number', 'reading-taken', { ...reading(DAIRY, 38), round: 1.5 }, 'round'],
    ['seven photos', 'note-added', { words: 'x', photos: Array.from({ length: 7 }, () => 'a'.repeat(64)) }, 'photos'],
    ['a photo that is no hash', 'note-added', { words: 'x', photos: ['A'.repeat(64)] }, 'photos.0: A file is named by its SHA-256'],
    ['a statement of one\'s own', 'submitted', { ...BODIES.submitted, statement: 'All is well.' }, 'statement'],
    ['an exception for nothing', 'left-in-exception', { points: [] }, 'points: Name at least one point'],
    ['nothing that is discarded', 'act-signed', { ...BODIES['act-signed'], quantity: 0 }, 'quantity: More than nothing'],
    ['a hand position with a second word', 'point-in-hand', { ...BODIES['point-in-hand'], hand: { hz: 40, percent: 1 } }, 'hand'],
    ['a strange field deep in a snapshot', 'outage-opened', { ...opening(), snapshot: { ...opening().snapshot, site: { ...opening().snapshot.site, owner: 'x' } } }, 'owner'],
    ['a plan whose step stands twice', 'plan-changed', { plan: { ...opening().plan, steps: [opening().plan.steps[0], opening().plan.steps[0]] }, note: '' }, 'stands twice'],
  ])('refuse %s', (_name, kind, body, words) => {
    expect(fault(kind, body)).toContain(words)
  })

  it('write what a form leaves out', () => {
    expect(schemaOf('note-added', 1)!.parse({ words: ' seen ' })).toEqual({ words: 'seen', photos: [] })
  })
})

describe('the registry', () => {
  it('knows its kinds and no inherited name', () => {
    expect(kinds.every(isEntryKind)).toBe(true)
    for (const name of ['constructor', '__proto__', 'toString', 'note_added', '']) expect(isEntryKind(name)).toBe(false)
    expect(kinds.filter(isServerKind).sort()).toEqual(['act-lapsed', 'act-opened', 'alert-acknowledged', 'alert-over', 'alert-passed-on', 'alert-raised', 'entry-refused', 'notice-acknowledged', 'notice-sent', 'outage-numbered', 'plant-warned', 'signer-named', 'verdict-changed'])
  })

  it('has no schema for a version to come', () => {
    for (const kind of kinds) expect([schemaOf(kind, newestVersion(kind) + 1), schemaOf(kind, 0)]).toEqual([null, null])
  })
})

describe('the envelope', () => {
  const { entry, signature } = storyTo('plan').entries.find(stored => stored.entry.kind === 'outage-opened')!

  it('takes every entry of a whole record', () => {
    const { entries } = storyTo('sealed')
    expect(entries.length).toBeGreaterThan(50)
    for (const stored of entries) {
      expect(signedEntrySchema.safeParse({ entry: stored.entry, signature: stored.signature }).success, stored.entry.kind).toBe(true)
      expect(fault(stored.entry.kind, stored.entry.body), stored.entry.kind).toBeNull()
    }
  })

  it.each<[string, object, string]>([
    ['a field more', { seq: 1 }, ''],
    ['an id in capitals', { id: uuidFor('x').toUpperCase() }, 'id'],
    ['a device in capitals', { device: technician.device.toUpperCase() }, 'device'],
    ['a person in capitals', { by: technician.id.toUpperCase() }, 'by'],
    ['a kind with a strange sign', { kind: 'note\u0000' }, 'kind'],
    ['a kind in capitals', { kind: 'Note-added' }, 'kind'],
    ['a count of nothing', { n: 0 }, 'n'],
    ['half a count', { n: 1.5 }, 'n'],
    ['a short hash', { prev: 'ab' }, 'prev'],
    ['no hash at all', { prev: undefined }, 'prev'],
    ['a skew in parts of a millisecond', { skew: 0.5 }, 'skew'],
    ['a body that is a list', { body: [] }, 'body'],
    ['a version of nothing', { v: 0 }, 'v'],
  ])('refuses %s', (_name, change, field) => {
    const parsed = envelopeSchema.safeParse({ ...entry, ...change })
    expect(parsed.success ? null : parsed.error.issues[0]!.path.join('.')).toBe(field)
  })

  it('takes the server as a signer', () => {
    expect(envelopeSchema.safeParse({ ...entry, by: SERVER }).success).toBe(true)
  })

  it.each([['cut short', signature.slice(1)], ['with padding', `${signature.slice(0, 84)}==`], ['in another alphabet', `+${signature.slice(1)}`]])('refuses a signature %s', (_name, wrong) => {
    expect(signedEntrySchema.safeParse({ entry, signature: wrong }).success).toBe(false)
  })

  it('takes one to a hundred entries at once', () => {
    const many = (count: number) => pushSchema.safeParse({ entries: Array.from({ length: count }, () => ({})) }).success
    expect([0, 1, 100, 101].map(many)).toEqual([false, true, true, false])
  })
})
