import { computed, toValue } from 'vue'
import type { MaybeRefOrGetter } from 'vue'
import { nextToDo } from '~~/shared/record/next-to-do'
import { forecastCase } from '~~/server/utils/hold/for-outage'
import { actNeeded } from '~~/server/utils/hold/act-needed'
import { assessCase } from '~~/server/utils/holding/for-outage'

/** How a case of this run stands now, by the same rules as on the server: verdict, the act that it needs, the next thing to do. */
export function useCaseNow(caseId: MaybeRefOrGetter<string>) {
  const { state, now } = useRun()
  /** Judged six times a minute: the minute matters, not the second. */
  const coarse = computed(() => Math.floor(now.value / 10_000) * 10_000)
  return computed(() => {
    const id = toValue(caseId)
    const known = state.value.snapshot.cases.find(item => item.id === id)
    const item = state.value.cases[id]
    if (!known || !item) return null
    // A reading signed within the last seconds counts at once.
    const at = Math.max(coarse.value, ...item.readings.map(reading => reading.at))
    const assessed = item.empty ? null : assessCase(state.value, id, at)
    const need = actNeeded(state.value, id, at, assessed)
    const judged = assessed && { ...assessed, deadline: assessed.deadline === null ? null : Date.parse(assessed.deadline) }
    const dueAt = state.value.phase === 'dark' ? forecastCase(state.value, known, at).dueAt : null
    const toDo = nextToDo(state.value, id, { judged, cause: need?.cause ?? null, dueAt }, at)
    return { judged, need, toDo }
  })
}
