import { computed, onMounted, ref } from 'vue'
import { navigateTo, useAsyncData, useAuth } from '#imports'
import type { BodyInput } from '~~/shared/record/kinds'
import type { Snapshot } from '~~/shared/record/snapshot'
import { uuidv7 } from '~~/shared/record/uuid'
import type { WorkKindItem } from '~~/shared/schemas/site-view'
import { useOutage } from '~/composables/useOutage'
import { keptEquipment } from '~/offline/equipment'
import { keptWorkKinds } from '~/offline/work-kinds'
import { fetchControllers, fetchSnapshot, fetchWorkKinds } from '~/queries/opening'
import type { ControllerItem } from '~/queries/opening'
import { readFault } from '~/utils/api-error'
import { signingFault } from '~/utils/signing-fault'

type Choice = ControllerItem & { keptAt?: number }

/** An error with which the server answered is told; where nothing is heard, this phone knows. */
function rethrowIfHeard(error: unknown): void {
  const status = (error as { status?: number }).status ?? 0
  if (status >= 400 && status < 500) throw error
}

async function controllersHere(person: string, error: unknown): Promise<Choice[]> {
  rethrowIfHeard(error)
  const held = await keptEquipment(person).catch(() => [])
  if (held.length === 0) throw error
  return held.map(({ snapshot: { controller, site }, keptAt }) => ({ id: controller.id, name: controller.name, place: controller.place, site: { id: site.id, code: site.code, name: site.name, timeZone: site.timeZone }, keptAt }))
}

/** The kinds of work: the server's, or those that this phone keeps. */
export async function workKindsFor(person: string): Promise<{ items: WorkKindItem[], keptAt: number | null }> {
  try {
    return { items: await fetchWorkKinds(), keptAt: null }
  } catch (error) {
    rethrowIfHeard(error)
    const held = await keptWorkKinds(person).catch(() => null)
    if (!held) throw error
    return held
  }
}

async function snapshotFor(controller: string, person: string): Promise<Snapshot> {
  try {
    return await fetchSnapshot(controller)
  } catch (error) {
    rethrowIfHeard(error)
    const held = (await keptEquipment(person).catch(() => [])).find(item => item.snapshot.controller.id === controller)
    if (!held) throw error
    return held.snapshot
  }
}

/** Opening an outage: of which controller, then the signed entry that carries its equipment. */
export function useOpening() {
  const user = useAuth().data.value!.user!
  const { data: controllers, error, status } = useAsyncData<Choice[]>('opening-controllers', () => fetchControllers().catch(error => controllersHere(user.id, error)))
  const controllerId = ref<string | null>(null)
  const controller = computed(() => controllers.value?.find(item => item.id === controllerId.value) ?? null)
  const options = computed(() => (controllers.value ?? []).map(item => ({ value: item.id, label: `${item.site.name} · ${item.name}` })))
  const outage = useOutage(uuidv7(Date.now()), { id: user.id, role: user.role })
  onMounted(() => outage.signer.load(user.id))
  const trouble = ref('')
  const busy = ref(false)
  /** the equipment is that which this phone keeps: the server could not be asked */
  const fromHere = computed(() => controllers.value?.some(item => item.keptAt !== undefined) ?? false)

  /** Reads the equipment, signs the opening that `body` makes of it, and goes to its run. */
  async function open(body: (snapshot: Snapshot) => BodyInput<'outage-opened'>): Promise<void> {
    if (!controller.value) { trouble.value = 'Choose a controller.'; return }
    trouble.value = ''
    busy.value = true
    try {
      const snapshot = await snapshotFor(controller.value.id, user.id)
      await outage.measure()
      const { receipt } = await outage.sign('outage-opened', body(snapshot))
      const { status: taken, why } = await receipt
      if (taken === 'refused') trouble.value = `Not taken into the record: ${why.join('; ')}.`
      else await navigateTo(`/outages/${outage.id}`)
    } catch (failure) {
      trouble.value = failure instanceof Error && failure.name !== 'FetchError' ? signingFault(failure) : readFault(failure).reason
    } finally {
      busy.value = false
    }
  }

  return { controllers, controllerId, controller, options, error, status, device: computed(() => outage.signer.device), trouble, busy, open, fromHere }
}
