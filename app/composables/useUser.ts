import type { ComputedRef } from 'vue'
import type { Role } from '~~/shared/schemas/people'

export interface User { id: string, name: string, email: string, role: Role, mustChangePassword: boolean }

/** Who is signed in; only for pages behind the sign-in. */
export function useUser(): ComputedRef<User | null> {
  const { data } = useAuth()
  return computed(() => (data.value?.user as User | undefined) ?? null)
}
