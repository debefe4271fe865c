import { computed, onScopeDispose, ref, shallowRef, watch } from 'vue'
import type { StoredEntry } from '~~/shared/record/entry'
import { fold } from '~~/shared/record/fold'
import type { BodyInput, EntryKind } from '~~/shared/record/kinds'
import { logRoot } from '~~/shared/record/merkle'
import { LIVE_PHASES } from '~~/shared/record/phases'
import type { Surroundings } from '~~/shared/record/rules'
import { emptyState } from '~~/shared/record/state'
import type { Role } from '~~/shared/schemas/people'
import { marginAt } from '~~/server/utils/hold/margin'
import { handBackAfter, planRefusals } from '~~/server/utils/order/for-outage'
import { keptFact, keepFact } from '~/offline/facts'
import { watchLog } from '~/offline/checkpoints'
import { drainFiles, keepFile } from '~/offline/files'
import { keptOutbox, onKeptChange } from '~/offline/kept'
import { forgetLog, keepLog, keptLog } from '~/offline/logs'
import type { OutboxEntry, PushResult, Trouble } from '~/offline/outbox-ports'
import { isWaiting, troubleOfFault } from '~/offline/outbox-ports'
import { fetchEntries, fetchServerTime, putFile } from '~/queries/entries'
import { useSigner } from '~/stores/signer'
import { stateHere } from '~/utils/state-here'

const POLL_MS = 5000
const POLL_QUIET_MS = 20_000
/** How long a signing screen waits for the receipt before it says "kept on this phone". */
const RECEIPT_MS = 4000

export type Signed = { status: 'accepted' | 'questioned' | 'refused' | 'kept', why: string[] }

/** What the engines say on this device; the root is compared by the server. */
export const SURROUNDINGS: Surroundings = { planRefusals, handBackAfter, margin: marginAt, filesAwaited: () => [], root: null }

/**
 * One outage on this device: the log as far as it is known, folded, with what is kept here and not
 * yet in it on top; and the way to sign a further entry. All of it works without a network.
 */
export function useOutage(id: string, person: { id: string, role: Role }) {
  const signer = useSigner()
  const outbox = keptOutbox()
  const sameLog = watchLog(id)
  const entries = shallowRef<StoredEntry[]>([])
  const base = shallowRef(emptyState(id))
  const kept = shallowRef<OutboxEntry[]>([])
  const loaded = ref(false)
  const failure = ref<'away' | 'missing' | null>(null)
  /** why this outage's entries wait, as the last attempt to send them says */
  const trouble = ref<Trouble | null>(null)
  /** the log could not be kept on this phone: it is gone when the page is left */
  const unkept = ref(false)
  const heardAt = ref<number | null>(null)
  const skew = ref(0)
  /** moves on while the server is away, so that verdicts follow the time */
  const alone = ref<number | null>(null)
  let timer: ReturnType<typeof setTimeout> | undefined
  let closed = false

  const own = computed(() => kept.value.filter(item => item.person === person.id))
  const pending = computed(() => own.value.filter(isWaiting))
  const refused = computed(() => own.value.filter(item => item.refusal !== null))
  const here = computed(() => stateHere(base.value, own.value.filter(item => item.refusal === null), person, SURROUNDINGS, alone.value))
  const state = computed(() => here.value.state)
  const checkedHere = computed(() => here.value.checkedHere)
  watch(() => state.value.phase, phase => signer.during(id, phase), { immediate: true })

  const readKept = async () => { kept.value = await outbox.entries(id) }

  /** Measures this device's clock against the server's before there is a log to ask for; without an answer it stays as it was last measured. */
  async function measure(): Promise<void> {
    skew.value = await keptFact('skew').catch(() => null) ?? skew.value
    const before = Date.now()
    const time = await fetchServerTime().catch(() => null)
    if (time) measured(before, time)
  }

  function measured(asked: number, serverTime: string): void {
    skew.value = skewOf(asked, serverTime)
    void keepFact('skew', skew.value).catch(() => undefined)
  }

  function take(fresh: StoredEntry[]): void {
    if (fresh.length === 0) return
    base.value = fold(fresh, base.value)
    entries.value = [...entries.value, ...fresh]
  }

  /** What this device holds, before the network is asked. */
  async function readHeld(): Promise<void> {
    skew.value = await keptFact('skew').catch(() => null) ?? 0
    const held = await keptLog(id, person.id).catch(() => null)
    if (held && base.value.size === 0) {
      take(held.entries)
      heardAt.value = held.about.heardAt + skew.value
    }
    await readKept().catch(() => { unkept.value = true })
    if (base.value.size > 0 || own.value.length > 0) loaded.value = true
  }

  async function pull(): Promise<void> {
    try {
      for (;;) {
        const before = Date.now()
        const page = await fetchEntries(id, base.value.size)
        measured(before, page.now)
        const fresh = page.entries.filter(stored => stored.seq > base.value.size)
        take(fresh)
        heardAt.value = Date.now()
        failure.value = null
        alone.value = null
        await sameLog.look(entries.value, page, device => base.value.signers[device]?.publicKey)
        // What this phone holds is not overwritten by another log.
        if (sameLog.parting.value) break
        await keepHere(fresh)
        if (fresh.length === 0 || base.value.size >= page.size) break
      }
    } catch (error) {
      const missing = (error as { status?: number }).status === 404
      await readKept().catch(() => undefined)
      failure.value = missing && pending.value.length === 0 ? 'missing' : 'away'
      if (failure.value === 'missing') await forgetLog(id).catch(() => undefined)
      else alone.value = Date.now() - skew.value
    }
    await readKept().catch(() => undefined)
    loaded.value = true
  }

  async function keepHere(fresh: StoredEntry[]): Promise<void> {
    const { snapshot, code, phase, planned, size } = base.value
    if (size === 0) return
    const about = { id, person: person.id, size, heardAt: Date.now() - skew.value, code, phase, planned, site: snapshot.site.name, controller: snapshot.controller.name, timeZone: snapshot.site.timeZone }
    await keepLog(about, fresh).then(() => { unkept.value = false }, () => { unkept.value = true })
    await outbox.collect(id, size).catch(() => undefined)
  }

  async function send(): Promise<Map<string, PushResult>> {
    if (sameLog.parting.value) return new Map()
    const { answers, trouble: met } = await outbox.drain(id, person.id).catch((error: unknown) => ({ answers: new Map<string, PushResult>(), trouble: troubleOfFault(error) }))
    trouble.value = met
    if (met === null) await drainFiles(id, person.id, putFile).catch(() => undefined)
    return answers
  }

  async function sync(): Promise<Map<string, PushResult>> {
    const answers = await send()
    await pull()
    return answers
  }

  /**
   * Signs an entry. Resolves once it is on this device, with the standing that this device foresees;
   * `receipt` resolves with the server's answer, or with `kept` when none came in good time.
   * @throws NotUnlocked when the PIN is asked for and not given
   */
  async function sign<K extends EntryKind>(kind: K, body: BodyInput<K>): Promise<{ foreseen: Signed, receipt: Promise<Signed> }> {
    if (sameLog.parting.value) throw new Error('this log is not the one that this phone saw')
    const key = await signer.unlocked(kind)
    const entry = await outbox.keep(key, id, kind, body, skew.value, base.value.chain[key.device] ?? null)
    await readKept()
    const doubt = state.value.questioned.find(item => item.entry === entry.id)
    return { foreseen: doubt ? { status: 'questioned', why: doubt.why } : { status: 'accepted', why: [] }, receipt: receiptOf(entry.id) }
  }

  async function receiptOf(entry: string): Promise<Signed> {
    const late = new Promise<null>(resolve => setTimeout(resolve, RECEIPT_MS, null))
    const answer = (await Promise.race([sync(), late]))?.get(entry)
    if (answer) return { status: answer.status, why: answer.status === 'refused' ? [answer.reason] : answer.why }
    // Another sync may have carried it: then its receipt is kept here, or the log has it.
    const found = kept.value.find(item => item.id === entry)
    if (found?.receipt) return found.receipt
    if (found?.refusal) return { status: 'refused', why: [found.refusal.reason] }
    const stored = entries.value.find(item => item.entry.id === entry)
    return stored ? { status: stored.standing, why: stored.why } : { status: 'kept', why: [] }
  }

  /** Keeps a photo or drawing to be sent after the entry that names it. */
  async function attach(sha256: string, blob: Blob): Promise<void> {
    await keepFile({ sha256, outage: id, person: person.id, blob, keptAt: new Date().toISOString() })
  }

  async function dismiss(entry: string): Promise<void> {
    await outbox.dismiss(entry)
    await readKept()
  }

  /** Root of the log as known here, for the seal. */
  const root = () => logRoot(entries.value)

  function schedule(): void {
    if (closed) return
    const live = LIVE_PHASES.includes(state.value.phase) || pending.value.length > 0
    timer = setTimeout(() => { void sync().finally(schedule) }, live ? POLL_MS : POLL_QUIET_MS)
  }

  async function open(): Promise<void> {
    await sameLog.open()
    await readHeld()
    if (!signer.loaded) await signer.load(person.id)
    await sync()
    schedule()
  }

  /** Another tab, or what sends in the background, changed what is kept: the log that it kept is taken first, so that no entry is out of sight. */
  async function hearChange(): Promise<void> {
    const held = await keptLog(id, person.id).catch(() => null)
    take((held?.entries ?? []).filter(stored => stored.seq > base.value.size))
    await readKept().catch(() => undefined)
  }

  const online = () => { void sync() }
  let deaf: () => void = () => undefined
  if (import.meta.client) {
    window.addEventListener('online', online)
    deaf = onKeptChange((outage) => {
      if (outage !== id) return
      void hearChange()
    })
  }
  onScopeDispose(() => {
    closed = true
    clearTimeout(timer)
    deaf()
    if (import.meta.client) window.removeEventListener('online', online)
  })

  return { id, person, signer, state, entries, base, kept: own, parting: sameLog.parting, pending, refused, checkedHere, loaded, failure, trouble, unkept, heardAt, skew, measure, open, sync, sign, attach, dismiss, root }
}

export type OutageHandle = ReturnType<typeof useOutage>

/** This device's time less the server's, ms, taking the answer to lie midway. @param asked Unix ms by this device */
function skewOf(asked: number, serverTime: string): number {
  return Math.round((asked + Date.now()) / 2 - Date.parse(serverTime))
}
