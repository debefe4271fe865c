import { computed, reactive, ref } from 'vue'
import type { TypedReading } from '~~/shared/import/readings'
import type { BookSite } from '~~/shared/schemas/site-view'
import type { Rulebook } from '~~/server/utils/holding'
import { judgeTrial, TRIAL_MOST } from '~/utils/trial'

/** A row of the trial, with a name of its own while others come and go. */
export interface TrialRow extends TypedReading { key: number }

/** An afternoon in which a case is lost, in each rulebook's own unit. */
const EXAMPLE: Record<'F' | 'C', string[]> = {
  F: ['38.3', '39.0', '40.6', '42.4', '44.1', '45.8'],
  C: ['3.5', '3.9', '4.8', '5.8', '6.7', '9.1'],
}
const EXAMPLE_TIMES = ['13:50', '14:10', '14:40', '15:20', '16:10', '17:30']

/** What is typed into a trial of a rulebook, and what the engine says of it at once, in the browser. */
export function useTrial(book: Rulebook, sites: () => readonly BookSite[]) {
  let count = 0
  const blank = (): TrialRow => ({ key: count++, time: '', value: '', method: 'product' })
  const rows = ref<TrialRow[]>([blank(), blank(), blank()])
  const form = reactive({
    foodClass: book.classes[0]!.id, unit: book.unit as 'F' | 'C', dark: '', now: '', interval: '10', as: 'book',
    own: { limit: '', minutes: '', addAccuracy: false, allowsMinus12: false },
  })
  const outcome = computed(() => judgeTrial(book, {
    ...form,
    rows: rows.value,
    as: form.as === 'own' ? 'own' : sites().find(site => site.id === form.as)?.holding ?? null,
  }))

  const isFilled = (row: TrialRow) => row.time.trim() !== '' || row.value.trim() !== ''
  function addRow(): number {
    const row = blank()
    rows.value.push(row)
    return row.key
  }
  function removeRow(key: number) {
    rows.value = rows.value.filter(row => row.key !== key)
    if (rows.value.length === 0) addRow()
  }
  /** Puts readings after those that stand; blank rows make way. Gives how many there was no room for. */
  function addReadings(readings: readonly TypedReading[]): number {
    const kept = rows.value.filter(isFilled)
    const room = TRIAL_MOST - kept.length
    rows.value = [...kept, ...readings.slice(0, room).map(reading => ({ ...reading, key: count++ }))]
    return Math.max(0, readings.length - room)
  }
  function clear() {
    rows.value = [blank(), blank(), blank()]
    Object.assign(form, { dark: '', now: '' })
  }
  function fillExample() {
    const values = EXAMPLE[book.unit]
    rows.value = EXAMPLE_TIMES.map((time, index) => ({ key: count++, time, value: values[index]!, method: 'product' }))
    Object.assign(form, { unit: book.unit, dark: '14:00', now: '18:40', interval: '60', foodClass: book.classes[0]!.id })
  }
  const filled = computed(() => rows.value.filter(isFilled).length)
  return { rows, form, outcome, filled, addRow, removeRow, addReadings, clear, fillExample }
}
