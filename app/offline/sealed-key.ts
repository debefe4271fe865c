/**
 * A private signing key as it lies on the disk: encrypted under a key from the person's PIN, and that
 * again under a key of the device which no script can read. WebCrypto only; no storage, no clock.
 */

/** Rounds of PBKDF2-SHA-256; OWASP's Password Storage Cheat Sheet asks for at least 600,000 (from memory). */
export const PIN_ROUNDS = 600_000

export interface SealedBytes {
  rounds: number
  salt: Uint8Array<ArrayBuffer>
  /** 12 bytes for the layer of the PIN, and 12 for that of the device */
  pinNonce: Uint8Array<ArrayBuffer>
  deviceNonce: Uint8Array<ArrayBuffer>
  bytes: Uint8Array<ArrayBuffer>
}

/** The PIN does not open the key. */
export class WrongPin extends Error {}
/** What is kept cannot be read with this device's key: the browser's storage is damaged, or came from elsewhere. */
export class KeyDamaged extends Error {}

/** An AES key that can be used by this browser, and read by nobody. */
export async function makeDeviceKey(): Promise<CryptoKey> {
  return crypto.subtle.generateKey({ name: 'AES-GCM', length: 256 }, false, ['encrypt', 'decrypt'])
}

/**
 * Seals a private key.
 * @param pkcs8 the private half in PKCS #8
 * @param name what it belongs to (the device's id): sealed bytes under another name do not open
 */
export async function sealKey(pkcs8: Uint8Array<ArrayBuffer>, pin: string, deviceKey: CryptoKey, name: string, rounds = PIN_ROUNDS): Promise<SealedBytes> {
  const [salt, pinNonce, deviceNonce] = [random(16), random(12), random(12)]
  const inner = await crypto.subtle.encrypt(aes(pinNonce, name), await pinKey(pin, salt, rounds), pkcs8)
  const outer = await crypto.subtle.encrypt(aes(deviceNonce, name), deviceKey, inner)
  return { rounds, salt, pinNonce, deviceNonce, bytes: new Uint8Array(outer) }
}

/**
 * Opens a sealed key for signing; what comes out can sign, and cannot be exported.
 * @throws WrongPin
 * @throws KeyDamaged
 */
export async function openSealed(sealed: SealedBytes, pin: string, deviceKey: CryptoKey, name: string): Promise<CryptoKey> {
  const inner = await crypto.subtle.decrypt(aes(sealed.deviceNonce, name), deviceKey, sealed.bytes).catch(() => { throw new KeyDamaged('The signing key kept in this browser cannot be read any more') })
  const pkcs8 = await crypto.subtle.decrypt(aes(sealed.pinNonce, name), await pinKey(pin, sealed.salt, sealed.rounds), inner).catch(() => { throw new WrongPin('This is not the PIN') })
  return crypto.subtle.importKey('pkcs8', pkcs8, 'Ed25519', false, ['sign'])
}

async function pinKey(pin: string, salt: Uint8Array<ArrayBuffer>, iterations: number): Promise<CryptoKey> {
  const base = await crypto.subtle.importKey('raw', new TextEncoder().encode(pin), 'PBKDF2', false, ['deriveKey'])
  return crypto.subtle.deriveKey({ name: 'PBKDF2', hash: 'SHA-256', salt, iterations }, base, { name: 'AES-GCM', length: 256 }, false, ['encrypt', 'decrypt'])
}

const aes = (iv: Uint8Array<ArrayBuffer>, name: string) => ({ name: 'AES-GCM', iv, additionalData: new TextEncoder().encode(name) })
const random = (length: number) => crypto.getRandomValues(new Uint8Array(length))
