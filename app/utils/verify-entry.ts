import type { StoredEntry } from '~~/shared/record/entry'
import { entryBytes } from '~~/shared/record/entry'

/** Bytes of a base64url text. */
function bytesOf(text: string): Uint8Array<ArrayBuffer> {
  return Uint8Array.from(atob(text.replaceAll('-', '+').replaceAll('_', '/')), char => char.charCodeAt(0))
}

/**
 * Verifies an entry's signature in this browser (Ed25519 by WebCrypto), in words.
 * @param publicKey the signer's key as the record names it, 32 bytes in base64url
 */
export async function verifyHere(stored: StoredEntry, publicKey: string | undefined): Promise<string> {
  if (!publicKey) return 'No key for it in this record:'
  try {
    const key = await crypto.subtle.importKey('raw', bytesOf(publicKey), 'Ed25519', false, ['verify'])
    const good = await crypto.subtle.verify('Ed25519', key, bytesOf(stored.signature), new Uint8Array(entryBytes(stored.entry)))
    return good ? 'Verified in this browser:' : 'Does NOT fit its signer\'s key:'
  } catch {
    return 'This browser cannot verify signatures; the PDF shows what the server verified:'
  }
}
