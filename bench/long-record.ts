/** A record of many entries, most of them readings without control, signed and judged as the server does. */
import { rulebookById } from '~~/server/utils/holding'
import { recordDocument } from '~~/shared/record/record-document'
import { PROGRAM_VERSION } from '~~/shared/program-version'
import type { RecordWriter } from '../tests/support/record'
import { technician } from '../tests/support/record'
import { DAIRY, FISH, reading, storyTo } from '../tests/unit/record/store'

export function longRecord(size: number): RecordWriter {
  const writer = storyTo('dark')
  while (writer.entries.length < size) {
    const count = writer.entries.length
    if (count % 4 === 0) writer.pass(0.2).sign(technician, 'reading-taken', reading(count % 8 === 0 ? DAIRY : FISH, 38))
    else writer.pass(0.05).sign(technician, 'note-added', { words: `Doors shut at ${count}` })
  }
  return writer
}

export function documentOf({ state, entries, checkpoints }: RecordWriter) {
  const { id, version } = state.snapshot.rulebook
  return recordDocument(state, entries, { program: PROGRAM_VERSION, rulebook: rulebookById(id, version) ?? null, checkpoints })
}
