import type { KeptPerson } from '~/offline/database'

/** Who is signed in, by the server; null: nobody. Throws where it cannot be heard. */
export async function fetchSession(): Promise<{ user: KeptPerson } | null> {
  const session = await $fetch<{ user?: KeptPerson }>('/api/auth/session', { retry: 0, timeout: 8000 })
  return session.user ? { user: session.user } : null
}
