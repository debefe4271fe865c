import { defineStore } from 'pinia'
import { ref, shallowRef } from 'vue'
import { canSign, keepKey, keptKey, makeKey } from '~/offline/keys'
import type { KeptKey } from '~/offline/database'

export interface EnrolledDevice { id: string, name: string, publicKey: string }

/** The signing key of the person on this device. */
export const useSigner = defineStore('signer', () => {
  const key = shallowRef<KeptKey | null>(null)
  const device = shallowRef<EnrolledDevice | null>(null)
  const supported = ref(true)
  const loaded = ref(false)

  function hold(found: KeptKey | null): void {
    key.value = found
    device.value = found ? { id: found.device, name: found.name, publicKey: found.publicKey } : null
  }

  /** Looks for a key of this person on this device. */
  async function load(person: string): Promise<void> {
    supported.value = await canSign()
    hold(await keptKey(person).catch(() => null))
    loaded.value = true
  }

  /**
   * Makes a key, registers its public half with a fresh password, then keeps it.
   * @throws the API's error (422 with `field` and `reason` for a wrong password)
   */
  async function enrol(person: string, { name, password }: { name: string, password: string }): Promise<void> {
    const made = await makeKey(person, name)
    await $fetch('/api/devices', { method: 'POST', body: { id: made.device, name, publicKey: made.publicKey, password } })
    await keepKey(made)
    hold(made)
  }

  return { key, device, supported, loaded, load, enrol }
})
