import type { z } from 'zod'
import type { PersonItem, personCreateSchema, personUpdateSchema } from '~~/shared/schemas/people'

/** Everybody, by name; for administrators. */
export function usePeople() {
  const request = useRequestFetch()
  return useAsyncData('people', async () => (await request<{ items: PersonItem[] }>('/api/people')).items)
}

export function createPerson(body: z.input<typeof personCreateSchema>): Promise<PersonItem> {
  return $fetch<PersonItem>('/api/people', { method: 'POST', body })
}

export function updatePerson(id: string, body: z.input<typeof personUpdateSchema>): Promise<PersonItem> {
  return $fetch<PersonItem>(`/api/people/${id}`, { method: 'PATCH', body })
}
