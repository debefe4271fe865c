/** A body of every kind of entry that a person or the server signs, as its schema writes it. */
import type { BodyInput, EntryKind } from '../../../shared/record/kinds'
import { SEAL_STATEMENT, SUBMIT_STATEMENT } from '../../../shared/record/kinds/review'
import { BEGAN, CIRCUIT, DAIRY, DRAWING, GROUP, INSTRUMENT, opening, planOf, pressure, reading } from './store'
import { isoTime } from '../../../shared/record/entry'
import { uuidFor } from '../../support/record'

const entryId = uuidFor('an entry')
const words = 'seen by torch'

/** A missing kind is a compile error. */
export const BODIES: { [K in EntryKind]: BodyInput<K> } = {
  'hands-offered': { to: entryId, toName: 'Bram Oster', size: 12, open: [{ what: 'in-hand', about: 'C-1', words: 'C-1, on by hand' }], words },
  'hands-withdrawn': { offer: entryId, reason: words },
  'hands-refused': { offer: entryId, reason: words },
  'hands-taken': { from: entryId, offer: entryId, looked: [{ what: 'act', about: DAIRY, found: words }], words },
  'voice-decision': { supervisor: entryId, supervisorName: 'Ines Calloway', givenAt: isoTime(BEGAN), words, decision: { kind: 'decided-otherwise', body: { caseId: DAIRY, reason: words, clause: words, photos: [] } } },
  'voice-confirmed': { decision: entryId, words },
  'voice-denied': { decision: entryId, reason: words },
  'outage-opened': opening(),
  'plan-changed': { plan: planOf(), note: words },
  'plan-submitted': { note: words },
  'plan-approved': { note: words },
  'margin-accepted': { minutes: -4, deadlineMinutes: null, reason: words },
  'plan-returned': { reason: words },
  'in-hand-begun': {},
  'called-off': { reason: words },
  'check-signed': { check: 'store-told', outcome: 'done', words, photos: [DRAWING] },
  'point-in-hand': { tag: 'C-1', hand: { hz: 45.5 }, seen: 'at-position', value: { number: 18.4, unit: 'A' }, until: isoTime(BEGAN), reason: words, words, photos: [DRAWING] },
  'point-excused': { tag: 'C-1', reason: words, measure: words, photos: [] },
  'point-in-auto': { tag: 'C-1', seen: 'not-called', words, photos: [] },
  'point-proven': { tag: 'C-1', words, photos: [] },
  'left-in-exception': { points: [{ tag: 'C-1', owner: 'Piet Harrow', by: isoTime(BEGAN), reason: words }] },
  'hand-back-closed': { words },
  'defrost-watched': { circuitId: CIRCUIT, words },
  'reading-taken': reading(DAIRY, 38.5, { words }),
  'pressure-read': { ...pressure(47.5), dischargePsig: 228, words },
  'act-signed': { caseId: DAIRY, act: 'discarded', product: 'yoghurt', quantity: 12.5, unit: 'kg', place: 'bin', coolBy: null, takenBy: 'Piet Harrow', left: false, words, photos: [] },
  'decided-otherwise': { caseId: DAIRY, reason: words, clause: '3-501.19', photos: [] },
  'instrument-checked': { instrumentId: INSTRUMENT, value: 32.4, unit: 'F', within: true, words },
  'went-dark': { lostAt: isoTime(BEGAN) },
  'control-lost': { lostAt: isoTime(BEGAN), words, photos: [] },
  'step-ticked': { step: 'load', state: 'begun', words },
  'turn-back-ordered': { reason: words },
  'turned-back': { reason: words },
  'control-back': { backAt: isoTime(BEGAN), words },
  'silence-announced': { until: isoTime(BEGAN), words },
  'note-added': { words, photos: [] },
  'correction': { corrects: entryId, reason: words, reading: { value: 39 } },
  'questioned-settled': { entry: entryId, words },
  'question-asked': { about: entryId, words },
  'question-answered': { question: entryId, words },
  'submitted': { statement: SUBMIT_STATEMENT, drawing: DRAWING, words },
  'review-begun': {},
  'returned': { reason: words },
  'sealed': { statement: SEAL_STATEMENT, drawing: DRAWING, size: 12, root: 'e'.repeat(64), words },
  'signer-named': { device: entryId, deviceName: 'Phone', person: entryId, name: 'Ada Quill', role: 'technician', publicKey: 'k'.repeat(43), enrolledAt: isoTime(BEGAN) },
  'outage-numbered': { code: 'Q001-0001' },
  'verdict-changed': { caseId: DAIRY, verdict: 'act', deadline: isoTime(BEGAN), minutesAbove: 12.5, clause: '3-501.16', source: 'FDA', act: 'Cool it', why: ['above'], judgedAt: isoTime(BEGAN) },
  'plant-warned': { fault: 'discharge-high', about: GROUP, words: 'discharge 380 psig', act: 'Add a condenser fan', over: false, judgedAt: isoTime(BEGAN) },
  'alert-raised': { key: 'round-late dairy 1', alert: 'round-late', about: [DAIRY], level: 1, words: 'Mill Lane: round late', until: isoTime(BEGAN), to: ['Ada Quill'], judgedAt: isoTime(BEGAN) },
  'alert-passed-on': { key: 'round-late dairy 1', level: 2, to: ['Ines Calloway'], judgedAt: isoTime(BEGAN) },
  'alert-acknowledged': { key: 'round-late dairy 1', person: entryId, name: 'Ines Calloway', acknowledgedAt: isoTime(BEGAN) },
  'alert-over': { key: 'round-late dairy 1', judgedAt: isoTime(BEGAN) },
  'act-lapsed': { caseId: DAIRY, holdMinutes: 25.5, judgedAt: isoTime(BEGAN) },
  'act-opened': { caseId: DAIRY, cause: 'deadline-near', deadline: isoTime(BEGAN), openedAt: isoTime(BEGAN) },
  'entry-refused': { device: entryId, n: 3, id: entryId, hash: 'e'.repeat(64), reason: words },
}
