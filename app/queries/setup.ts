import type { z } from 'zod'
import type { setupSchema } from '~~/shared/schemas/people'

/** Whether the first administrator is still to be made. */
export function useSetup() {
  return useAsyncData('setup', () => $fetch('/api/setup'))
}

export function makeFirstAdministrator(body: z.output<typeof setupSchema>): Promise<{ email: string }> {
  return $fetch<{ email: string }>('/api/setup', { method: 'POST', body })
}
