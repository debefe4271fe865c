import type { KeptPerson } from '~/offline/database'
import { fetchEquipment, fetchWorkKinds } from '~/queries/opening'
import { fetchSession } from '~/queries/session'
import { refreshEquipment } from '~/offline/equipment'
import { forgetOthers, keepPerson } from '~/offline/person'
import { refreshWorkKinds } from '~/offline/work-kinds'
import { useSending } from '~/stores/sending'

/**
 * Keeps who is signed in on this device, and, where a shell opened without asking, asks the server. Another
 * person's session makes the page theirs at once; a session that ended takes nothing away.
 */
export default defineNuxtPlugin((nuxtApp) => {
  const session = useState<{ user: KeptPerson } | null | undefined>('auth:data', () => undefined)
  const sending = useSending()
  sending.person = session.value?.user.id ?? null

  async function take(user: KeptPerson): Promise<void> {
    const { id, name, email, role, mustChangePassword } = user
    sending.session = 'current'
    await keepPerson({ id, name, email, role, mustChangePassword }).catch(() => undefined)
    await forgetOthers(id).catch(() => undefined)
    if (mustChangePassword || (role !== 'technician' && role !== 'supervisor')) return
    await refreshEquipment(id, Date.now(), fetchEquipment).catch(() => undefined)
    await refreshWorkKinds(id, Date.now(), fetchWorkKinds).catch(() => undefined)
  }

  /** @returns whether the server was heard */
  async function ask(): Promise<boolean> {
    try {
      const answer = await fetchSession()
      if (answer === null) sending.session = 'ended'
      else if (session.value && answer.user.id !== session.value.user.id) {
        await take(answer.user)
        reloadNuxtApp({ force: true })
      } else {
        session.value = answer
        sending.person = answer.user.id
        await take(answer.user)
      }
      return true
    } catch {
      return false
    }
  }

  if (nuxtApp.payload.serverRendered) {
    if (session.value) void take(session.value.user)
    else sending.session = 'ended'
    return
  }
  async function askUntilHeard(): Promise<void> {
    if (!await ask()) setTimeout(() => { void askUntilHeard() }, ASK_AGAIN_MS)
  }
  nuxtApp.hook('app:mounted', () => { void askUntilHeard() })
})

const ASK_AGAIN_MS = 5000
