import { computed, toRaw } from 'vue'
import type { Plan } from '~~/shared/record/plan'
import { marginAt } from '~~/server/utils/hold/margin'
import { useRun, useSigning } from '~/composables/useRun'

const MINUTE = 60_000

/** The margin of this outage as it stands, worked out again with each entry and each minute. */
export function usePlanMargin() {
  const { state, now } = useRun()
  const minute = computed(() => Math.floor(now.value / MINUTE) * MINUTE)
  return { margin: computed(() => marginAt(state.value, minute.value)), minute }
}

/** Signing one change of the plan from where it is read. */
export function usePlanChange() {
  const { state, person } = useRun()
  const { busy, trouble, act } = useSigning()
  const may = computed(() => (person.role === 'technician' || person.role === 'supervisor') && state.value.planned && ['plan', 'approved'].includes(state.value.phase))

  /** @param note what was changed, as the log says it */
  async function change(part: Partial<Plan>, note: string): Promise<boolean> {
    const plan = structuredClone({ ...toRaw(state.value.plan), ...toRaw(part) })
    return act('plan-changed', { plan, note })
  }

  return { may, busy, trouble, change }
}
