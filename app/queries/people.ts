import type { z } from 'zod'
import type { MaybeRefOrGetter } from 'vue'
import type { PeoplePage, PersonItem, Role, personCreateSchema, personUpdateSchema } from '~~/shared/schemas/people'

export interface PeopleFilter { q?: string, role?: Role, account?: 'on' | 'off' }

/** The first page of accounts by name, for administrators. It is read anew when the filter changes. */
export function usePeople(filter: MaybeRefOrGetter<PeopleFilter> = {}) {
  const request = useRequestFetch()
  return useAsyncData(() => `people:${JSON.stringify(toValue(filter))}`, () => request<PeoplePage>('/api/people', { query: toValue(filter) }))
}

/** A further page: `after` is the `next` of the one before. */
export function fetchPeople(filter: PeopleFilter, after: string): Promise<PeoplePage> {
  return $fetch<PeoplePage>('/api/people', { query: { ...filter, after } })
}

/** One account. */
export function usePerson(id: string) {
  const request = useRequestFetch()
  const path: string = `/api/people/${id}`
  return useAsyncData(`person-${id}`, () => request<PersonItem>(path))
}

export function createPerson(body: z.input<typeof personCreateSchema>): Promise<PersonItem> {
  return $fetch<PersonItem>('/api/people', { method: 'POST', body })
}

export function updatePerson(id: string, body: z.input<typeof personUpdateSchema>): Promise<PersonItem> {
  return $fetch<PersonItem>(`/api/people/${id}`, { method: 'PATCH', body })
}

/** Writes the invitation again of somebody who has not chosen a password yet. */
export function inviteAgain(id: string): Promise<PersonItem> {
  const path: string = `/api/people/${id}/invitation`
  return $fetch<PersonItem>(path, { method: 'POST' })
}
