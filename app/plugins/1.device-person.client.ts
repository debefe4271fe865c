import type { KeptPerson } from '~/offline/database'
import { fetchSession } from '~/queries/session'
import { keptFact } from '~/offline/facts'

/**
 * A shell opens without asking the network who is signed in: who was signed in here when the server last
 * said so is taken to be it, and nuxt-auth then finds its answer already there. The server trusts no page;
 * what it says about the session comes a moment later (3.session.client.ts).
 */
export default defineNuxtPlugin({
  name: 'holdover-device-person',
  enforce: 'pre',
  async setup(nuxtApp) {
    if (nuxtApp.payload.serverRendered) return
    const session = useState<{ user: KeptPerson } | null | undefined>('auth:data', () => undefined)
    const person = await keptFact('person').catch(() => null)
    if (person) session.value = { user: person }
    // Nobody is known here: without a network nobody can be.
    else session.value = await fetchSession().catch(() => null)
  },
})
