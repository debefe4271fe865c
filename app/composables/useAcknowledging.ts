import { ref } from 'vue'
import type { AlertLine } from '~~/shared/record/alerts'
import { acknowledgeAlert } from '~/queries/alerts'
import { readFault } from '~/utils/api-error'

/** Saying that one has seen an alert: which one is under way, and what went wrong in words. @param done reads anew what is shown */
export function useAcknowledging(done: () => Promise<unknown>) {
  /** outage and key of the one that is under way */
  const busy = ref<string | null>(null)
  const trouble = ref('')

  async function acknowledge({ outage, key }: Pick<AlertLine, 'outage' | 'key'>): Promise<void> {
    if (busy.value !== null) return
    busy.value = `${outage} ${key}`
    trouble.value = ''
    try {
      await acknowledgeAlert(outage, key)
      await done()
    } catch (error) {
      const { status, reason } = readFault(error)
      trouble.value = status === 0 ? 'No connection: nobody knows yet that you have seen it. Try again once there is one.' : status === 401 ? 'You are signed out: sign in again, then say that you have seen it.' : reason
    }
    busy.value = null
  }
  return { busy, trouble, acknowledge }
}
