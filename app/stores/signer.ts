import { defineStore } from 'pinia'
import { computed, ref, shallowRef } from 'vue'
import type { Phase } from '~~/shared/record/phases'
import { GATES } from '~~/shared/signing/gate-kinds'
import type { SignedAct } from '~~/shared/signing/gate-kinds'
import { IDLE_MINUTES, isIdle, waitLeft } from '~~/shared/signing/pin'
import { canSign, forgetKey, hasPin, keepKey, keptKey, makeKey, openWithPin, plainUnlocked } from '~/offline/keys'
import type { PinAnswer, UnlockedKey } from '~/offline/keys'
import type { KeptKey } from '~/offline/database'

export interface EnrolledDevice { id: string, name: string, publicKey: string }

/** The PIN was asked for and not given: nothing is signed. */
export class NotUnlocked extends Error {}

/** The PIN dialog that stands open: which act it is for, and whom it answers. */
export interface PinRequest { kind: SignedAct | null, settle: (key: UnlockedKey | null) => void }

/** The signing key of the person on this device. Unlocked it stands in the memory of this page only. */
export const useSigner = defineStore('signer', () => {
  const key = shallowRef<KeptKey | null>(null)
  const device = shallowRef<EnrolledDevice | null>(null)
  const supported = ref(true)
  const loaded = ref(false)
  const open = shallowRef<UnlockedKey | null>(null)
  /** it locked by itself, and has not been opened since */
  const idled = ref(false)
  const request = shallowRef<PinRequest | null>(null)
  const live = shallowRef<ReadonlySet<string>>(new Set())
  let lastActive = 0
  let asking: Promise<UnlockedKey> | null = null

  const locked = computed(() => open.value === null)
  const idleMinutes = computed(() => live.value.size > 0 ? IDLE_MINUTES.live : IDLE_MINUTES.quiet)
  const pinless = computed(() => key.value !== null && !hasPin(key.value))

  function hold(found: KeptKey | null): void {
    if (found?.device !== open.value?.device) lock()
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
   * Makes a key sealed under the PIN, registers its public half with a fresh password, then keeps it. The
   * key that it takes the place of is revoked with the same request.
   * @throws the API's error (422 with `field` and `reason` for a wrong password)
   */
  async function enrol(person: string, { name, password, pin }: { name: string, password: string, pin: string }): Promise<void> {
    const { kept, unlocked } = await makeKey(person, name, pin)
    // Where there is no room for the key, nothing is enrolled that could then not sign.
    await keepKey({ ...kept, person: `${person}/room` })
    await forgetKey(`${person}/room`)
    await $fetch('/api/devices', { method: 'POST', body: { id: kept.device, name, publicKey: kept.publicKey, password, replaces: key.value?.device ?? null } })
    await keepKey(kept)
    hold(kept)
    opened(unlocked)
  }

  /** Takes the key off this device. What it signed and has not sent stays, and is still sent. */
  async function forget(person: string): Promise<void> {
    await forgetKey(person)
    hold(null)
  }

  /** The device has another name now. */
  async function renamed(id: string, name: string): Promise<void> {
    if (key.value?.device !== id) return
    const kept = await keptKey(key.value.person)
    if (kept?.device !== id) return
    await keepKey({ ...kept, name })
    hold({ ...kept, name })
  }

  /**
   * The key, ready to sign; asks for the PIN where it is locked, and before a gate always.
   * @throws NotUnlocked when the person gives none
   */
  function unlocked(kind: SignedAct): Promise<UnlockedKey> {
    if (!key.value) return Promise.reject(new Error('This browser is not enrolled to sign for you'))
    touch()
    if (open.value && !GATES[kind]) return Promise.resolve(open.value)
    return ask(kind)
  }

  function ask(kind: SignedAct | null): Promise<UnlockedKey> {
    asking ??= new Promise<UnlockedKey>((resolve, reject) => {
      request.value = { kind, settle: found => found ? resolve(found) : reject(new NotUnlocked('Nothing is signed: the PIN was not given.')) }
    }).finally(() => {
      request.value = null
      asking = null
    })
    return asking
  }

  /** Tries a PIN for the request that stands open. @throws KeyDamaged */
  async function tryPin(pin: string): Promise<PinAnswer> {
    const answer = await openWithPin(key.value!.person, pin, Date.now())
    if (answer.key) {
      opened(answer.key)
      request.value?.settle(answer.key)
    }
    return answer
  }

  /** Signs on with a key of before PINs, where none can be set for want of a network. */
  function goOnWithoutPin(): void {
    if (key.value && !hasPin(key.value)) request.value?.settle(plainUnlocked(key.value))
  }

  /** How long wrong PINs make wait still, ms, and how many there were. */
  async function pinWait(): Promise<{ wrong: number, wait: number }> {
    const kept = key.value ? await keptKey(key.value.person) : null
    return kept && hasPin(kept) ? { wrong: kept.tries.wrong, wait: waitLeft(kept.tries, Date.now()) } : { wrong: 0, wait: 0 }
  }

  function opened(found: UnlockedKey): void {
    open.value = found
    idled.value = false
    lastActive = Date.now()
  }

  function lock(): void {
    open.value = null
    idled.value = false
  }

  /** Locks what has been quiet too long. */
  function lockIdle(): void {
    if (!open.value || !isIdle(lastActive, Date.now(), live.value.size > 0)) return
    lock()
    idled.value = true
  }

  /** The person is here: a touch, a key, a signature. */
  function touch(): void {
    lockIdle()
    if (open.value) lastActive = Date.now()
  }

  /** An outage of this person is now in this phase; in hand or dark it keeps signing open longer. */
  function during(outage: string, phase: Phase): void {
    const others = [...live.value].filter(id => id !== outage)
    live.value = new Set(phase === 'in-hand' || phase === 'dark' ? [...others, outage] : others)
  }

  return { key, device, supported, loaded, locked, idled, idleMinutes, pinless, request, load, enrol, forget, renamed, unlocked, ask, tryPin, goOnWithoutPin, pinWait, lock, lockIdle, touch, during }
})
