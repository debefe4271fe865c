import type { InjectionKey, Ref } from 'vue'
import { inject, provide, ref } from 'vue'
import { navigateTo, useRouter } from '#imports'
import { clockWords } from '~~/shared/charts/words'
import type { BodyInput, EntryKind } from '~~/shared/record/kinds'
import type { OutageHandle, Signed } from '~/composables/useOutage'
import { NotUnlocked } from '~/stores/signer'
import { encodePhoto } from '~/utils/photos'
import { signingFault } from '~/utils/signing-fault'

export interface Run extends OutageHandle { now: Readonly<Ref<number>> }

const KEY: InjectionKey<Run> = Symbol('run')

export function provideRun(run: Run): void {
  provide(KEY, run)
}

/** The outage whose run this screen belongs to. */
export function useRun(): Run {
  const run = inject(KEY)
  if (!run) throw new Error('useRun outside the run of an outage')
  return run
}

/** Time of day at the site. */
export function useSiteClock() {
  const { state } = useRun()
  return (ms: number, seconds = false) => clockWords(new Date(ms).toISOString(), state.value.snapshot.site.timeZone, seconds)
}

/** Acts that end a screen or open a gate: the screen waits for the server's answer; all others go on once kept. */
const WAITED_FOR: ReadonlySet<EntryKind> = new Set([
  'plan-changed', 'plan-submitted', 'plan-approved', 'plan-returned', 'margin-accepted', 'in-hand-begun', 'called-off',
  'went-dark', 'control-back', 'turn-back-ordered', 'hand-back-closed', 'submitted', 'returned', 'sealed', 'left-in-exception', 'decided-otherwise', 'hands-offered', 'hands-taken', 'voice-confirmed', 'voice-denied',
])

/** Signing from a screen: what is under way, and what came of it in words. */
export function useSigning() {
  const run = useRun()
  const router = useRouter()
  const busy = ref(false)
  const trouble = ref<string[]>([])

  /**
   * Signs an entry, then goes where `then` says. A body whose photos are still to be drawn anew comes as a function. A questioned entry is in the record, and its
   * reason is shown; a refused one is not, and the screen stays.
   * @returns whether it is signed and kept or in the record as accepted
   */
  async function act<K extends EntryKind>(kind: K, body: BodyInput<K> | (() => Promise<BodyInput<K>>), then?: string): Promise<boolean> {
    if (busy.value) return false
    busy.value = true
    trouble.value = []
    const here = router.currentRoute.value.fullPath
    try {
      const { foreseen, receipt } = await run.sign(kind, typeof body === 'function' ? await body() : body)
      const { status, why } = WAITED_FOR.has(kind) ? await receipt : foreseen
      if (!WAITED_FOR.has(kind)) void receipt.then(late => tell(late.status === foreseen.status ? 'kept' : late.status, late.why))
      tell(status, why)
      const good = status === 'accepted' || status === 'kept'
      // Who has gone on to another screen meanwhile is left there.
      if (good && then !== undefined && router.currentRoute.value.fullPath === here) await navigateTo(then)
      return good
    } catch (error) {
      trouble.value = [error instanceof NotUnlocked ? error.message : error instanceof Error && error.name === 'ZodError' ? faultOf(error) : signingFault(error)]
      return false
    } finally {
      busy.value = false
    }
  }

  function tell(status: Signed['status'], why: string[]): void {
    if (status === 'refused') trouble.value = [`Not taken into the record: ${why.join('; ')}.`]
    if (status === 'questioned') trouble.value = [`In the record, but questioned: ${why.join('; ')}.`]
  }

  /** Strips and keeps photos; their hashes go into the entry. */
  async function photosOf(files: (File | null)[]): Promise<string[]> {
    const hashes: string[] = []
    for (const file of files) {
      if (!file) continue
      const { sha256, blob } = await encodePhoto(file)
      await run.attach(sha256, blob)
      hashes.push(sha256)
    }
    return hashes
  }

  return { busy, trouble, act, photosOf }
}

function faultOf(error: Error): string {
  const issues = (error as unknown as { issues: { path: (string | number)[], message: string }[] }).issues
  return issues.map(issue => issue.message).join('; ')
}
