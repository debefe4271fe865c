import type { ACTS } from '~~/shared/record/kinds/rounds'

type SignedAct = (typeof ACTS)[number]

/** Acts in the order in which they are offered. */
export const ACT_CHOICES: readonly SignedAct[] = ['cool-by', 'moved', 'night-covers', 'ice', 'used', 'emptied', 'restored-by-hand', 'discarded', 'accepted-warm']
/** Acts that say which product, how much and where. */
export const HANDLES_PRODUCT: readonly SignedAct[] = ['moved', 'used', 'emptied', 'discarded']

export interface ActForm { product: string, quantity: string | number | null, unit: string, place: string, takenBy: string, left: boolean | null, words: string }
export const EMPTY_ACT: ActForm = { product: '', quantity: null, unit: '', place: '', takenBy: '', left: null, words: '' }

/**
 * What is missing of an act before it can be signed, in words; null when nothing is.
 * @param coolBy the promised time, Unix ms @param deadline when the verdict gets worse, Unix ms
 */
export function actFault(act: SignedAct, form: ActForm, coolBy: number | null, deadline: number | null): string | null {
  if (act === 'cool-by' && coolBy !== null && deadline !== null && coolBy > deadline) return 'That is after its verdict gets worse: promise an earlier time, or move, use or discard the product.'
  if (!HANDLES_PRODUCT.includes(act)) return null
  const { quantity } = form
  const amount = quantity === null || quantity === '' ? null : Number(String(quantity).replace(',', '.'))
  if (amount !== null && !(amount > 0)) return 'Quantity: write a number above nothing.'
  if (act === 'discarded' && form.product.trim() === '') return 'Name the product that is discarded.'
  if (act === 'discarded' && (amount === null || form.unit.trim() === '')) return 'Say how much is discarded, and in which unit.'
  if (act === 'discarded' && form.takenBy.trim() === '') return 'Say who took what is discarded.'
  if (act === 'moved' && form.place.trim() === '') return 'Say where the product was moved to.'
  return form.left === null ? 'Say whether product is left in the case.' : null
}
