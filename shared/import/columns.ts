/** The columns of a point list and what a cell of each may hold. */
import { ON_LOSS } from '../schemas/equipment'
import type { HandPosition, PointKind } from '../schemas/point-kinds'
import { HAND_WORDS_FIXED, handPositionSchema, POINT_KINDS } from '../schemas/point-kinds'

export const POINT_COLUMNS = [
  'tag', 'kind', 'name', 'address', 'place', 'means', 'guards', 'rack', 'suction_group', 'circuit', 'cases',
  'rated_a', 'capacity_kw', 'min_off_min', 'hand', 'on_loss', 'through_off',
] as const
export type PointColumn = (typeof POINT_COLUMNS)[number]
export const REQUIRED_COLUMNS = ['tag', 'kind', 'name'] as const satisfies readonly PointColumn[]

/** What a row says, by its columns. A column that the file lacks is absent here; an empty cell is null, '' or []. */
export interface PointCells {
  tag: string
  kind: PointKind
  name: string
  address?: string
  place?: string
  means?: string
  guards?: string[]
  rack?: string | null
  suction_group?: string | null
  circuit?: string | null
  cases?: string[]
  rated_a?: number | null
  capacity_kw?: number | null
  min_off_min?: number | null
  hand?: HandPosition | null
  on_loss?: (typeof ON_LOSS)[number]
  through_off?: boolean
}

/** The value of a cell, or why it cannot be read. */
export type Cell<T> = { value: T } | { fault: string }

const list = (text: string): Cell<string[]> => ({ value: text.split(';').map(part => part.trim()).filter(part => part !== '') })
const textOrNull = (text: string): Cell<string | null> => ({ value: text === '' ? null : text })

/** How the text of each cell, without the blanks around it, becomes a value. @param comma whether 18,4 is a number here */
export const READ_CELL: { [C in PointColumn]: (text: string, comma: boolean) => Cell<NonNullable<PointCells[C]> | null> } = {
  tag: required('Write a tag'),
  kind: readKind,
  name: required('Write a name'),
  address: text => ({ value: text }),
  place: text => ({ value: text }),
  means: text => ({ value: text }),
  guards: list,
  rack: textOrNull,
  suction_group: textOrNull,
  circuit: textOrNull,
  cases: list,
  rated_a: readNumber,
  capacity_kw: readNumber,
  min_off_min: readNumber,
  hand: readHand,
  on_loss: readOnLoss,
  through_off: readYesNo,
}

function required(reason: string): (text: string) => Cell<string> {
  return text => text === '' ? { fault: reason } : { value: text }
}

function readKind(text: string): Cell<PointKind> {
  const kind = POINT_KINDS.find(known => known === text.toLowerCase().replace(/[\s_]+/g, '-'))
  return kind ? { value: kind } : { fault: text === '' ? 'Write a kind' : `There is no kind ${text}; write one of ${POINT_KINDS.join(', ')}` }
}

function readNumber(text: string, comma: boolean): Cell<number | null> {
  if (text === '') return { value: null }
  const number = Number(comma ? text.replace(',', '.') : text)
  return /^[+-]?\d*[.,]?\d+$/.test(text) && Number.isFinite(number) ? { value: number } : { fault: `${text} is not a number` }
}

/** on, off, open, closed, as-found, 45 Hz, 60 %. */
function readHand(text: string, comma: boolean): Cell<HandPosition | null> {
  if (text === '') return { value: null }
  const word = HAND_WORDS_FIXED.find(known => known === text.toLowerCase().replace(/\s+/g, '-'))
  if (word) return { value: word }
  const speed = /^(\d+(?:[.,]\d+)?)\s*(hz|%)$/i.exec(text)
  const number = speed ? readNumber(speed[1]!, comma) : { fault: '' }
  if (!speed || 'fault' in number) return { fault: `${text} is no hand position; write on, off, open, closed, as-found, 45 Hz or 60 %` }
  const parsed = handPositionSchema.safeParse(speed[2] === '%' ? { percent: number.value } : { hz: number.value })
  return parsed.success ? { value: parsed.data } : { fault: `${text} is out of range: at most 400 Hz or 100 %` }
}

function readOnLoss(text: string): Cell<(typeof ON_LOSS)[number]> {
  const value = ON_LOSS.find(known => known === (text.toLowerCase() || 'unknown'))
  return value ? { value } : { fault: `${text} is none of ${ON_LOSS.join(', ')}` }
}

function readYesNo(text: string): Cell<boolean> {
  const word = text.toLowerCase() || 'no'
  return word === 'yes' || word === 'no' ? { value: word === 'yes' } : { fault: `${text} is neither yes nor no` }
}

/** A hand position as the file writes it, the other way round. */
export function handCell(hand: HandPosition): string {
  if (typeof hand === 'string') return hand
  return 'hz' in hand ? `${hand.hz} Hz` : `${hand.percent} %`
}
