import { uuidv7 } from '~~/shared/record/uuid'
import type { KeptKey } from './database'
import { openKept, STRICT } from './database'

/** Whether this browser can make Ed25519 keys (Chromium 137+, Firefox 129+, Safari 17+, on HTTPS or loopback). */
export async function canSign(): Promise<boolean> {
  try {
    await crypto.subtle.generateKey('Ed25519', false, ['sign', 'verify'])
    return true
  } catch {
    return false
  }
}

/** A key pair not yet kept: it is kept once the server knows its public half. */
export async function makeKey(person: string, name: string): Promise<KeptKey> {
  const pair = await crypto.subtle.generateKey('Ed25519', false, ['sign', 'verify']) as CryptoKeyPair
  const raw = new Uint8Array(await crypto.subtle.exportKey('raw', pair.publicKey))
  const now = Date.now()
  return { person, device: uuidv7(now), name, publicKey: base64url(raw), privateKey: pair.privateKey, enrolledAt: new Date(now).toISOString() }
}

export async function keepKey(key: KeptKey): Promise<void> {
  const tx = (await openKept()).transaction('keys', 'readwrite', STRICT)
  await tx.store.put(key)
  await tx.done
}

export async function keptKey(person: string): Promise<KeptKey | null> {
  return await (await openKept()).get('keys', person) ?? null
}

export async function forgetKey(person: string): Promise<void> {
  await (await openKept()).delete('keys', person)
}

/** Signs bytes; 64 bytes in base64url. */
export async function signWith(key: KeptKey, bytes: Uint8Array): Promise<string> {
  return base64url(new Uint8Array(await crypto.subtle.sign('Ed25519', key.privateKey, bytes as BufferSource)))
}

function base64url(bytes: Uint8Array): string {
  return btoa(String.fromCharCode(...bytes)).replaceAll('+', '-').replaceAll('/', '_').replaceAll('=', '')
}
