import { computed, onMounted, shallowRef } from 'vue'
import type { Role } from '~~/shared/schemas/people'
import type { Colleague } from '~/queries/colleagues'
import { fetchColleagues } from '~/queries/colleagues'

/** Everybody of the site but oneself, for a choice; those whom the record names already where nobody else is known. */
export function useColleagues(...roles: Role[]) {
  const { state, person } = useRun()
  const read = shallowRef<Colleague[] | null>(null)
  onMounted(async () => { read.value = await fetchColleagues(state.value.id) })
  const named = computed<Colleague[]>(() => Object.values(state.value.signers).flatMap(({ person: id, name, role }) => role === 'server' ? [] : [{ id, name, role }]))
  const colleagues = computed(() => {
    const byId = new Map([...named.value, ...read.value ?? []].map(item => [item.id, item]))
    return [...byId.values()].filter(item => item.id !== person.id && roles.includes(item.role)).sort((a, b) => a.name.localeCompare(b.name) || a.id.localeCompare(b.id))
  })
  return { colleagues }
}
