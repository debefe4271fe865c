import type { ComputedRef } from 'vue'
import { fetchDevices } from '~/queries/account'
import { useSigner } from '~/stores/signer'

/** Whether this browser can sign for the person: not known yet, enrolled, not enrolled, or unable to be. */
export type SigningState = 'unknown' | 'enrolled' | 'missing' | 'unsupported'

/**
 * The signing device of who is signed in, looked up once the page is in the browser. A key that was revoked
 * elsewhere is forgotten here, so that the person is asked to enrol anew.
 */
export function useSigningDevice(): { state: ComputedRef<SigningState>, reload: () => Promise<void> } {
  const signer = useSigner()
  const user = useUser()

  async function reload(): Promise<void> {
    if (!user.value) return
    await signer.load(user.value.id)
    const held = signer.device
    if (!held) return
    const known = await fetchDevices().catch(() => null) // no answer proves nothing
    if (known?.find(device => device.id === held.id)?.revokedAt) {
      await signer.forget(user.value.id)
    }
  }
  onMounted(reload)

  const state = computed<SigningState>(() => !signer.loaded ? 'unknown' : signer.device ? 'enrolled' : signer.supported ? 'missing' : 'unsupported')
  return { state, reload }
}
