import { onMounted, ref, shallowRef } from 'vue'
import type { StoredEntry } from '~~/shared/record/entry'
import { fold } from '~~/shared/record/fold'
import { emptyState } from '~~/shared/record/state'
import { fetchEntries } from '~/queries/entries'
import { readFault } from '~/utils/api-error'
import type { ApiFault } from '~/utils/api-error'

/** One record as the server holds it: all entries, page by page, folded here by the same code as there. */
export function useRecord(id: string) {
  const entries = shallowRef<StoredEntry[]>([])
  const state = shallowRef(emptyState(id))
  const size = ref<number | null>(null)
  const complete = ref(false)
  const reading = ref(false)
  const fault = shallowRef<ApiFault | null>(null)

  /** Reads what is not here yet. */
  async function read(): Promise<void> {
    if (reading.value) return
    reading.value = true
    fault.value = null
    try {
      const fresh: StoredEntry[] = []
      for (let known = state.value.size; ;) {
        const page = await fetchEntries(id, known)
        fresh.push(...page.entries)
        known = page.entries.at(-1)?.seq ?? known
        size.value = page.size
        if (page.entries.length === 0 || known >= page.size) break
      }
      // Folded once at the end: a half-read log has no meaning of its own.
      if (fresh.length > 0) {
        state.value = fold(fresh, state.value)
        entries.value = [...entries.value, ...fresh]
      }
      complete.value = true
    } catch (error) {
      fault.value = readFault(error)
    }
    reading.value = false
  }

  onMounted(read)
  return { state, entries, size, complete, reading, fault, read }
}
