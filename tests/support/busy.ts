/** An outage in which everything that a record can hold went on: for its summary, its page and its paper. */
import { isoTime } from '../../shared/record/entry'
import { uuidFor, supervisor, technician, testSigner } from './record'
import type { RecordWriter } from './record'
import type { Scenario } from './scenario'
import { buildRecord, caseId } from './scenario'

/** A name in Latin, Greek and Cyrillic letters, and one sign that no font of the paper has. */
export const farTechnician = testSigner('Łucja Ångström Ελένη Жук 漢', 'technician', 'Tablet')
export const LONG_WORDS = Array.from({ length: 260 }, (_, index) => `word${index}`).join(' ')
/** Longer than a column, with no place to break. */
export const LONG_TOKEN = 'x'.repeat(180)
export const AWAITED = 'a'.repeat(64)

const reading = (writer: RecordWriter, name: string, value: number, more = {}) => writer.pass(0.1).sign(technician, 'reading-taken', { round: 5, caseId: caseId(name), value, unit: 'F', method: 'product', instrumentId: null, ...more })

export const busy: Scenario = {
  site: { paper: 'A4' },
  excuse: ['LT-1'],
  during: {
    'in-hand': (writer) => {
      writer.pass(0.5).sign(farTechnician, 'note-added', { words: LONG_WORDS }, { skew: 7 * 60_000 })
      writer.pass(0.2).sign(technician, 'note-added', { words: `=1+1 ${LONG_TOKEN}`, photos: [AWAITED] })
    },
    'dark': (writer) => {
      const warm = reading(writer, 'Dairy wall 4–7', 43.2, { words: 'top shelf, =SUM(A1)' })
      writer.pass(0.2).sign(technician, 'act-signed', { caseId: caseId('Dairy wall 4–7'), act: 'ice', quantity: null, words: 'dry ice on the top shelf' })
      writer.pass(0.2).sign(technician, 'act-signed', { caseId: caseId('Fish service'), act: 'discarded', product: 'oysters', quantity: 3.5, unit: 'kg', place: 'bin room', takenBy: 'Piet Harrow' })
      writer.pass(0.1).sign(technician, 'correction', { corrects: warm.id, reason: 'misread the display', reading: { value: 42.3 } })
      const struck = reading(writer, 'Meat 1–3', 61)
      writer.pass(0.1).sign(technician, 'correction', { corrects: struck.id, reason: 'probe was in my hand', reading: 'struck' })
      const odd = writer.pass(0.1).sign(technician, 'step-ticked', { step: 'nowhere', state: 'done' }, { expect: 'questioned' })
      writer.pass(0.1).sign(technician, 'questioned-settled', { entry: odd.id, words: 'pressed the wrong line' })
      writer.serverEntry('entry-refused', { device: technician.device, n: writer.state.chain[technician.device]!.n + 1, id: uuidFor('a refused entry'), hash: 'b'.repeat(64), reason: 'The body is not written as its kind lays down' })
      const question = writer.pass(0.1).sign(supervisor, 'question-asked', { about: null, words: 'Are the night covers down?' })
      writer.pass(0.1).sign(technician, 'question-answered', { question: question.id, words: 'Yes, on all of the dairy wall.' })
      writer.pass(0.1).sign(technician, 'turned-back', { reason: 'the new software does not start' })
      writer.pass(0.1).sign(supervisor, 'decided-otherwise', { caseId: caseId('Dairy wall 4–7'), reason: 'under two hours', clause: '3-501.19' })
    },
    'hand-back': (writer) => {
      writer.pass(0.1).sign(supervisor, 'left-in-exception', { points: [{ tag: 'ASH-1', owner: 'Bram Oster', by: isoTime(writer.now + 86_400_000), reason: 'relay to be changed tomorrow' }] })
    },
  },
}

/** @param until the stage in which it stops; it cannot be sealed, for a photo is awaited */
export function busyRecord(until: Exclude<Scenario['until'], 'sealed'> = 'submitted'): RecordWriter {
  return buildRecord({ ...busy, until })
}
