import type { MailboxItem, MailboxMessage, MailItem, MailPage, MailSettings, MailState } from '~~/shared/schemas/mails'

/** The first page of mails in a state, or of all. */
export function useMails(state: MailState | undefined) {
  const request = useRequestFetch()
  return useAsyncData(`mails-${state ?? 'all'}`, () => request<MailPage>('/api/mails', { query: { state } }))
}

/** One further page. @param before the `next` of the page before it */
export function fetchMails(state: MailState | undefined, before: string): Promise<MailPage> {
  return $fetch<MailPage>('/api/mails', { query: { state, before } })
}

export function tryMailAgain(id: string): Promise<MailItem> {
  const path: string = `/api/mails/${id}/retry`
  return $fetch<MailItem>(path, { method: 'POST' })
}

/** How mail goes out here. */
export function useMailSettings() {
  const request = useRequestFetch()
  return useAsyncData('mail-settings', () => request<MailSettings>('/api/mails/settings'))
}

/** What the demo's mailbox received. */
export function useMailbox() {
  const request = useRequestFetch()
  return useAsyncData('mailbox', async () => (await request<{ items: MailboxItem[] }>('/api/mailbox')).items)
}

/** One message of the demo's mailbox. */
export function useMailboxMessage(name: string) {
  const request = useRequestFetch()
  const path: string = `/api/mailbox/${encodeURIComponent(name)}`
  return useAsyncData(`mailbox-${name}`, () => request<MailboxMessage>(path))
}
