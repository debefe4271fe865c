import { computed, onMounted, ref } from 'vue'
import { navigateTo, useAsyncData, useAuth } from '#imports'
import type { BodyInput } from '~~/shared/record/kinds'
import type { Snapshot } from '~~/shared/record/snapshot'
import { uuidv7 } from '~~/shared/record/uuid'
import { useOutage } from '~/composables/useOutage'
import { fetchControllers, fetchSnapshot } from '~/queries/opening'
import { readFault } from '~/utils/api-error'

/** Opening an outage: of which controller, then the signed entry that carries its equipment. */
export function useOpening() {
  const user = useAuth().data.value!.user!
  const { data: controllers, error, status } = useAsyncData('opening-controllers', fetchControllers)
  const controllerId = ref<string | null>(null)
  const controller = computed(() => controllers.value?.find(item => item.id === controllerId.value) ?? null)
  const options = computed(() => (controllers.value ?? []).map(item => ({ value: item.id, label: `${item.site.name} · ${item.name}` })))
  const outage = useOutage(uuidv7(Date.now()), { id: user.id, role: user.role })
  onMounted(() => outage.signer.load(user.id))
  const trouble = ref('')
  const busy = ref(false)

  /** Reads the equipment, signs the opening that `body` makes of it, and goes to its run. */
  async function open(body: (snapshot: Snapshot) => BodyInput<'outage-opened'>): Promise<void> {
    if (!controller.value) { trouble.value = 'Choose a controller.'; return }
    trouble.value = ''
    busy.value = true
    try {
      const snapshot = await fetchSnapshot(controller.value.id)
      await outage.measure()
      const { receipt } = await outage.sign('outage-opened', body(snapshot))
      const { status: taken, why } = await receipt
      if (taken === 'refused') trouble.value = `Not taken into the record: ${why.join('; ')}.`
      else await navigateTo(`/outages/${outage.id}`)
    } catch (failure) {
      trouble.value = failure instanceof Error && failure.name !== 'FetchError' ? failure.message : readFault(failure).reason
    } finally {
      busy.value = false
    }
  }

  return { controllers, controllerId, controller, options, error, status, device: computed(() => outage.signer.device), trouble, busy, open }
}
