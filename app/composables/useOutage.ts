import { computed, onScopeDispose, ref, shallowRef } from 'vue'
import type { StoredEntry } from '~~/shared/record/entry'
import { applyStored, fold } from '~~/shared/record/fold'
import type { BodyInput, EntryKind } from '~~/shared/record/kinds'
import { logRoot } from '~~/shared/record/merkle'
import { LIVE_PHASES } from '~~/shared/record/phases'
import type { Surroundings } from '~~/shared/record/rules'
import { judge } from '~~/shared/record/rules'
import type { OutageState } from '~~/shared/record/state'
import { emptyState } from '~~/shared/record/state'
import type { Role } from '~~/shared/schemas/people'
import { handBackAfter, planRefusals } from '~~/server/utils/order/for-outage'
import type { KeptEntry } from '~/offline/database'
import { drainFiles, keepFile } from '~/offline/files'
import { dismissRefused, drain, keepSigned, keptEntries, Unreachable } from '~/offline/outbox'
import type { PushResult } from '~/offline/outbox'
import { fetchEntries, fetchServerTime, pushEntries, putFile } from '~/queries/entries'
import { useSigner } from '~/stores/signer'

const POLL_MS = 5000
const POLL_QUIET_MS = 20_000
/** How long a signing screen waits for the receipt before it says "kept on this phone". */
const RECEIPT_MS = 4000

export type Signed = { status: 'accepted' | 'questioned' | 'refused' | 'kept', why: string[] }

/** What the engines say on this device; the root is compared by the server. */
export const SURROUNDINGS: Surroundings = { planRefusals, handBackAfter, margin: () => [], filesAwaited: () => [], root: null }

/**
 * One outage on this device: the log as far as it is known, folded, with what is kept here and not
 * yet sent on top; and the way to sign a further entry.
 */
export function useOutage(id: string, person: { id: string, role: Role }) {
  const signer = useSigner()
  const entries = shallowRef<StoredEntry[]>([])
  const base = shallowRef<OutageState>(emptyState(id))
  const kept = shallowRef<KeptEntry[]>([])
  const loaded = ref(false)
  const failure = ref<'away' | 'missing' | null>(null)
  const heardAt = ref<number | null>(null)
  const skew = ref(0)
  let timer: ReturnType<typeof setTimeout> | undefined
  let closed = false

  const pending = computed(() => kept.value.filter(item => item.refusal === null))
  const refused = computed(() => kept.value.filter(item => item.refusal !== null && item.person === person.id))
  const state = computed(() => withPending(base.value, pending.value, person))

  /** Measures this device's clock against the server's before there is a log to ask for; without an answer it stays as it was. */
  async function measure(): Promise<void> {
    const before = Date.now()
    const time = await fetchServerTime().catch(() => null)
    if (time) skew.value = skewOf(before, time)
  }

  async function pull(): Promise<void> {
    try {
      for (;;) {
        const before = Date.now()
        const page = await fetchEntries(id, base.value.size)
        skew.value = skewOf(before, page.now)
        const fresh = page.entries.filter(stored => stored.seq > base.value.size)
        if (fresh.length > 0) {
          base.value = fold(fresh, base.value)
          entries.value = [...entries.value, ...fresh]
        }
        heardAt.value = Date.now()
        failure.value = null
        if (fresh.length === 0 || base.value.size >= page.size) break
      }
    } catch (error) {
      const status = (error as { status?: number }).status
      failure.value = status === 404 ? 'missing' : 'away'
      if (status === 404 && pending.value.length > 0) failure.value = 'away'
    }
    kept.value = await keptEntries(id)
    loaded.value = true
  }

  async function send(): Promise<Map<string, PushResult>> {
    if (!signer.key) return new Map()
    try {
      const answers = await drain(id, person.id, pushEntries)
      await drainFiles(id, person.id, async file => await putFile(id, file.sha256, file.blob) ? 'held' : 'later')
      return answers
    } catch (error) {
      if (!(error instanceof Unreachable)) throw error
      failure.value = 'away'
      return new Map()
    }
  }

  async function sync(): Promise<Map<string, PushResult>> {
    const answers = await send()
    await pull()
    return answers
  }

  /**
   * Signs an entry. Resolves once it is on this device, with the standing that this device foresees;
   * `receipt` resolves with the server's answer, or with `kept` when none came in good time.
   */
  async function sign<K extends EntryKind>(kind: K, body: BodyInput<K>): Promise<{ foreseen: Signed, receipt: Promise<Signed> }> {
    if (!signer.key) throw new Error('This device is not enrolled for signing')
    const entry = await keepSigned(signer.key, id, kind, body, skew.value, base.value.chain[signer.key.device] ?? null)
    kept.value = await keptEntries(id)
    const doubt = state.value.questioned.find(item => item.entry === entry.id)
    return { foreseen: doubt ? { status: 'questioned', why: doubt.why } : { status: 'accepted', why: [] }, receipt: receiptOf(entry.id) }
  }

  async function receiptOf(entry: string): Promise<Signed> {
    const late = new Promise<null>(resolve => setTimeout(resolve, RECEIPT_MS, null))
    const answer = (await Promise.race([sync(), late]))?.get(entry)
    if (answer) return { status: answer.status, why: answer.status === 'refused' ? [answer.reason ?? 'Refused'] : answer.why ?? [] }
    // Another sync may have carried it: then the log has it.
    const stored = entries.value.find(item => item.entry.id === entry)
    return stored ? { status: stored.standing, why: stored.why } : { status: 'kept', why: [] }
  }

  /** Keeps a photo or drawing to be sent after the entry that names it. */
  async function attach(sha256: string, blob: Blob): Promise<void> {
    await keepFile({ sha256, outage: id, person: person.id, blob, keptAt: new Date().toISOString() })
  }

  async function dismiss(entry: string): Promise<void> {
    await dismissRefused(entry)
    kept.value = await keptEntries(id)
  }

  /** Root of the log as known here, for the seal. */
  const root = () => logRoot(entries.value)

  function schedule(): void {
    if (closed) return
    const live = LIVE_PHASES.includes(state.value.phase) || pending.value.length > 0
    timer = setTimeout(() => { void sync().finally(schedule) }, live ? POLL_MS : POLL_QUIET_MS)
  }

  async function open(): Promise<void> {
    if (!signer.loaded) await signer.load(person.id)
    await sync()
    schedule()
  }

  const online = () => { void sync() }
  if (import.meta.client) window.addEventListener('online', online)
  onScopeDispose(() => {
    closed = true
    clearTimeout(timer)
    if (import.meta.client) window.removeEventListener('online', online)
  })

  return { id, person, signer, state, entries, base, pending, refused, loaded, failure, heardAt, skew, measure, open, sync, sign, attach, dismiss, root }
}

export type OutageHandle = ReturnType<typeof useOutage>

/** This device's time less the server's, ms, taking the answer to lie midway. @param asked Unix ms by this device */
function skewOf(asked: number, serverTime: string): number {
  return Math.round((asked + Date.now()) / 2 - Date.parse(serverTime))
}

/** The state with what is kept here on top, each judged as the server will. */
function withPending(base: OutageState, pending: KeptEntry[], person: { id: string, role: Role }): OutageState {
  if (pending.length === 0) return base
  const state = structuredClone(base)
  for (const { entry, signature, keptAt } of pending) {
    const judged = judge(state, entry, person, SURROUNDINGS)
    applyStored(state, { entry, signature, seq: state.size + 1, receivedAt: keptAt, standing: judged.standing === 'accepted' ? 'accepted' : 'questioned', why: judged.why })
  }
  return state
}
