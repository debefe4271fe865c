import { uuidv7 } from '~~/shared/record/uuid'
import { NO_TRIES, waitAfterWrong, waitLeft } from '~~/shared/signing/pin'
import type { KeptKey, PinKey, PlainKey } from './database'
import { openKept, STRICT } from './database'
import { browserLocks } from './locks'
import type { Locks, Signing } from './outbox-ports'
import { makeDeviceKey, openSealed, sealKey, WrongPin } from './sealed-key'

/** A key that can sign now; it lives in the memory of this page only. */
export type UnlockedKey = Signing

/** Where keys are kept: IndexedDB, or a stand-in of a test. */
export interface KeyShelf {
  get: (person: string) => Promise<KeptKey | null>
  put: (key: KeptKey) => Promise<void>
  delete: (person: string) => Promise<void>
  /** runs one thing at a time for a person, across tabs */
  alone: <T>(person: string, act: () => Promise<T>) => Promise<T>
}

let locks: Locks | null = null

const SHELF: KeyShelf = {
  get: async person => await (await openKept()).get('keys', person) ?? null,
  async put(key) {
    const tx = (await openKept()).transaction('keys', 'readwrite', STRICT)
    await tx.store.put(key)
    await tx.done
  },
  delete: async person => (await openKept()).delete('keys', person),
  alone: (person, act) => (locks ??= browserLocks()).run(`holdover-pin-${person}`, act),
}

/** Whether this browser can make Ed25519 keys (Chromium 137+, Firefox 129+, Safari 17+, on HTTPS or loopback). */
export async function canSign(): Promise<boolean> {
  try {
    await crypto.subtle.generateKey('Ed25519', false, ['sign', 'verify'])
    return true
  } catch {
    return false
  }
}

/** A new key pair, sealed under the PIN and not yet kept: it is kept once the server knows its public half. */
export async function makeKey(person: string, name: string, pin: string, rounds?: number): Promise<{ kept: PinKey, unlocked: UnlockedKey }> {
  const pair = await crypto.subtle.generateKey('Ed25519', true, ['sign', 'verify']) as CryptoKeyPair
  const publicKey = base64url(new Uint8Array(await crypto.subtle.exportKey('raw', pair.publicKey)))
  const pkcs8 = new Uint8Array(await crypto.subtle.exportKey('pkcs8', pair.privateKey))
  const [now, deviceKey] = [Date.now(), await makeDeviceKey()]
  const device = uuidv7(now)
  const sealed = await sealKey(pkcs8, pin, deviceKey, device, rounds)
  pkcs8.fill(0)
  const kept: PinKey = { person, device, name, publicKey, enrolledAt: new Date(now).toISOString(), sealed, deviceKey, tries: NO_TRIES }
  return { kept, unlocked: unlockedOf(kept, await openSealed(sealed, pin, deviceKey, device)) }
}

export async function keepKey(key: KeptKey, shelf = SHELF): Promise<void> {
  await shelf.put(key)
}

export async function keptKey(person: string, shelf = SHELF): Promise<KeptKey | null> {
  return shelf.get(person)
}

export async function forgetKey(person: string, shelf = SHELF): Promise<void> {
  await shelf.delete(person)
}

export const hasPin = (key: KeptKey): key is PinKey => 'sealed' in key

/** A key of before PINs, as it is. */
export const plainUnlocked = (key: PlainKey): UnlockedKey => unlockedOf(key, key.privateKey)

/** What came of a PIN: the key, or how many were wrong in a row and how long to wait, ms. */
export type PinAnswer = { key: UnlockedKey } | { key: null, wrong: number, wait: number }

/**
 * Tries a PIN. The try is on the disk before the key is touched, so that a reload in between forgives nothing.
 * @param now Unix ms
 * @throws KeyDamaged
 */
export async function openWithPin(person: string, pin: string, now: number, shelf = SHELF): Promise<PinAnswer> {
  return shelf.alone(person, async () => {
    const kept = await shelf.get(person)
    if (!kept || !hasPin(kept)) throw new Error('There is no signing key with a PIN in this browser')
    const wait = waitLeft(kept.tries, now)
    if (wait > 0) return { key: null, wrong: kept.tries.wrong, wait }
    const wrong = kept.tries.wrong + 1
    await shelf.put({ ...kept, tries: { wrong, lastAt: now } })
    try {
      const opened = await openSealed(kept.sealed, pin, kept.deviceKey, kept.device)
      await shelf.put({ ...kept, tries: NO_TRIES })
      return { key: unlockedOf(kept, opened) }
    } catch (fault) {
      if (!(fault instanceof WrongPin)) throw fault
      return { key: null, wrong, wait: waitAfterWrong(wrong) }
    }
  })
}

function unlockedOf({ person, device }: { person: string, device: string }, key: CryptoKey): UnlockedKey {
  return { person, device, sign: async bytes => base64url(new Uint8Array(await crypto.subtle.sign('Ed25519', key, bytes as BufferSource))) }
}

function base64url(bytes: Uint8Array): string {
  return btoa(String.fromCharCode(...bytes)).replaceAll('+', '-').replaceAll('/', '_').replaceAll('=', '')
}
