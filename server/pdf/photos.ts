import { clockWords } from '../../shared/charts/words'
import { happenedAt, isoTime } from '../../shared/record/entry'
import { nameOf } from '../../shared/record/select'
import { told } from '../../shared/record/words'
import type { RecordPaper } from './record'
import type { Sheet } from './sheet'
import { COLOURS } from './sheet'
import type { Row } from './table'
import { drawTable } from './table'
import type { Style } from './typesetter'

const ACROSS = 3
const GAP = 14
/** Height of the box that a photo is fitted into, points. */
const BOX = 112
const WORDS: Style = { size: 8, colour: COLOURS.ink }
const HASH: Style = { face: 'mono', size: 6.5, colour: COLOURS['ink-2'] }
const LINE = 10
const HASH_LINE = 8.4

interface Photo { hash: string, seq: number, caption: string, did: string }
interface Place { x: number, y: number, width: number }

/** Photos as small pictures, each with its entry and the hash that was signed; then the drawn signatures by their hashes. */
export async function drawPhotos(sheet: Sheet, paper: RecordPaper): Promise<void> {
  const photos = [...photosOf(paper)]
  if (photos.length > 0) {
    sheet.begin('Photos', BOX + 60)
    sheet.paragraph('Each is named by the SHA-256 of its bytes, which the signed entry holds; what is printed here is a smaller copy.', { style: { size: 7.5 }, after: 6 })
    const width = (sheet.width - GAP * (ACROSS - 1)) / ACROSS
    for (let from = 0; from < photos.length; from += ACROSS) {
      await drawRow(sheet, paper, photos.slice(from, from + ACROSS), width)
      await sheet.pace.rest()
    }
  }
  const drawings = paper.entries.flatMap(({ seq, entry }) => 'drawing' in entry.body && typeof entry.body.drawing === 'string' ? [{ seq, hash: entry.body.drawing, by: nameOf(paper.state, entry.by) }] : [])
  if (drawings.length === 0) return
  sheet.begin('Drawn signatures')
  await drawTable(sheet, [{ label: 'No.', width: 30 }, { label: 'By', width: 0.4 }, { label: 'SHA-256 of the drawing', width: 280, style: { face: 'mono', size: 7 } }, { label: '', width: 50 }],
    drawings.map(({ seq, hash, by }): Row => [String(seq), by, hash, paper.held.has(hash) ? 'held' : 'awaited']))
}

function* photosOf({ state, entries, summary }: RecordPaper): Generator<Photo> {
  for (const { seq, entry } of entries) {
    if (!('photos' in entry.body)) continue
    const { did, seen } = told(state, entry)
    for (const hash of entry.body.photos) {
      yield { hash, seq, did, caption: `No. ${seq}, ${clockWords(isoTime(happenedAt(entry)), summary.heading.timeZone, true)}, ${nameOf(state, entry.by)}: ${[did, seen].filter(Boolean).join(', ')}` }
    }
  }
}

async function drawRow(sheet: Sheet, { held, picture }: RecordPaper, photos: readonly Photo[], width: number): Promise<void> {
  const captions = photos.map(({ caption }) => sheet.type.wrap(caption, width, WORDS, 4))
  const pictures: (Uint8Array | null)[] = []
  for (const { hash } of photos) pictures.push(held.has(hash) ? await picture(hash) : null)
  const height = BOX + 6 + Math.max(...captions.map(lines => lines.length)) * LINE + 2 * HASH_LINE
  sheet.need(height)
  photos.forEach((photo, index) => drawOne(sheet, { photo, bytes: pictures[index]!, awaited: !held.has(photo.hash), lines: captions[index]! }, { x: sheet.left + index * (width + GAP), y: sheet.y, width }))
  sheet.y += height + 12
}

function drawOne(sheet: Sheet, { photo, bytes, awaited, lines }: { photo: Photo, bytes: Uint8Array | null, awaited: boolean, lines: string[] }, { x, y, width }: Place): void {
  const { doc, type } = sheet
  if (bytes) {
    const figure = sheet.element('Figure', { alt: `Photo of entry ${photo.seq}: ${photo.did}`, bbox: [x, y, x + width, y + BOX] })
    sheet.content(figure, 'Figure', () => doc.image(Buffer.from(bytes), x, y, { fit: [width, BOX], valign: 'center' } as never))
    figure.end()
  } else {
    sheet.artifact(() => doc.rect(x + 0.5, y + 0.5, width - 1, BOX - 1).lineWidth(0.75).dash(3, { space: 3 }).stroke(COLOURS.field).undash())
    const note = sheet.element('P')
    sheet.content(note, 'P', () => type.drawCentred(awaited ? 'awaited' : 'cannot be read now', x + width / 2, y + BOX / 2, { size: 8, colour: COLOURS['ink-2'] }))
    note.end()
  }
  const words = sheet.element('P')
  sheet.content(words, 'P', () => {
    lines.forEach((line, index) => type.draw(line, x, y + BOX + 12 + index * LINE, WORDS))
    const below = y + BOX + 12 + lines.length * LINE
    const half = photo.hash.length / 2
    type.draw(photo.hash.slice(0, half), x, below, HASH)
    type.draw(photo.hash.slice(half), x, below + HASH_LINE, HASH)
  })
  words.end()
}
