import type { PasswordLink } from '~~/shared/schemas/people'

export type PasswordPurpose = 'invitation' | 'password-reset'

const pathOf = (purpose: PasswordPurpose, token: string): string => `/api/password-links/${purpose}/${encodeURIComponent(token)}`

/** Whether a link to a new password can be sent here. */
export function usePasswordLinks() {
  const request = useRequestFetch()
  return useAsyncData('password-links', () => request<{ on: boolean }>('/api/password-links'))
}

/** Whose password a link is about. */
export function usePasswordLink(purpose: PasswordPurpose, token: string) {
  const request = useRequestFetch()
  return useAsyncData(`password-link-${token}`, () => request<PasswordLink>(pathOf(purpose, token)))
}

export function askForPassword(email: string): Promise<{ asked: boolean }> {
  return $fetch<{ asked: boolean }>('/api/password-links', { method: 'POST', body: { email } })
}

export function setPasswordByLink(purpose: PasswordPurpose, token: string, password: string): Promise<{ changed: boolean }> {
  return $fetch<{ changed: boolean }>(pathOf(purpose, token), { method: 'POST', body: { password } })
}
