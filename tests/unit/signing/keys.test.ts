// Keys under a PIN; the rules are this project's own. Signatures are checked a second way by Node's own crypto, which shares no code with WebCrypto's caller.
import { createPublicKey, pbkdf2Sync, createDecipheriv, verify } from 'node:crypto'
import { describe, expect, it } from 'vitest'
import type { KeptKey, PinKey } from '../../../app/offline/database'
import type { KeyShelf } from '../../../app/offline/keys'
import { hasPin, keepKey, keptKey, makeKey, openWithPin, plainUnlocked } from '../../../app/offline/keys'
import { KeyDamaged, makeDeviceKey, openSealed, PIN_ROUNDS, sealKey, WrongPin } from '../../../app/offline/sealed-key'

const PERSON = '11111111-1111-4111-8111-111111111111'
/** Fast enough for a test; the browser's rounds are looked at by themselves. */
const ROUNDS = 1000

function shelf(): KeyShelf & { kept: Map<string, KeptKey>, writes: KeptKey[] } {
  const kept = new Map<string, KeptKey>()
  const writes: KeptKey[] = []
  let last: Promise<unknown> = Promise.resolve()
  return {
    kept, writes,
    get: async person => kept.get(person) ?? null,
    put: async (key) => { kept.set(key.person, key); writes.push(key) },
    delete: async (person) => { kept.delete(person) },
    alone: (_person, act) => { const next = last.then(act, act); last = next.catch(() => {}); return next },
  }
}

async function enrolled(pin = '407152') {
  const here = shelf()
  const { kept, unlocked } = await makeKey(PERSON, 'Phone', pin, ROUNDS)
  await keepKey(kept, here)
  return { here, kept, unlocked }
}

const bytes = new TextEncoder().encode('an entry')
function isSignedBy(publicKey: string, signature: string): boolean {
  const key = createPublicKey({ key: { kty: 'OKP', crv: 'Ed25519', x: publicKey }, format: 'jwk' })
  return verify(null, bytes, key, Buffer.from(signature, 'base64url'))
}
const triesOf = (here: KeyShelf & { kept: Map<string, KeptKey> }) => (here.kept.get(PERSON) as PinKey).tries

describe('a sealed key', () => {
  it('signs once opened, and with the PIN alone or the device alone it does not', async () => {
    const { kept } = await enrolled()
    const opened = await openSealed(kept.sealed, '407152', kept.deviceKey, kept.device)
    expect(opened.extractable).toBe(false)
    await expect(openSealed(kept.sealed, '407153', kept.deviceKey, kept.device)).rejects.toBeInstanceOf(WrongPin)
    await expect(openSealed(kept.sealed, '407152', await makeDeviceKey(), kept.device)).rejects.toBeInstanceOf(KeyDamaged)
    await expect(openSealed(kept.sealed, '407152', kept.deviceKey, PERSON)).rejects.toBeInstanceOf(KeyDamaged)
    expect(isSignedBy(kept.publicKey, await (await openWithPin(PERSON, '407152', 0, await shelfWith(kept))).key!.sign(bytes))).toBe(true)
  })
  it('lies on the disk without its private half in the clear, and its device key cannot be read', async () => {
    const { kept } = await enrolled()
    expect(kept.deviceKey.extractable).toBe(false)
    await expect(crypto.subtle.exportKey('raw', kept.deviceKey)).rejects.toThrow()
    // PKCS #8 of an Ed25519 key begins with these bytes (RFC 8410).
    expect(Buffer.from(kept.sealed.bytes).includes(Buffer.from('302e020100300506032b6570', 'hex'))).toBe(false)
  })
  it('takes at least 600,000 rounds', () => {
    expect(PIN_ROUNDS).toBeGreaterThanOrEqual(600_000)
  })
  it('is AES-256-GCM under PBKDF2-SHA-256, as Node\'s own crypto opens it', async () => {
    const secret = crypto.getRandomValues(new Uint8Array(48))
    const raw = await crypto.subtle.generateKey({ name: 'AES-GCM', length: 256 }, true, ['encrypt', 'decrypt'])
    const sealed = await sealKey(secret, '407152', raw, 'name', ROUNDS)
    const open = (key: Uint8Array, nonce: Uint8Array, sealedBytes: Buffer) => {
      const cipher = createDecipheriv('aes-256-gcm', key, nonce)
      cipher.setAAD(Buffer.from('name'))
      cipher.setAuthTag(sealedBytes.subarray(-16))
      return Buffer.concat([cipher.update(sealedBytes.subarray(0, -16)), cipher.final()])
    }
    const inner = open(new Uint8Array(await crypto.subtle.exportKey('raw', raw)), sealed.deviceNonce, Buffer.from(sealed.bytes))
    expect(open(pbkdf2Sync('407152', sealed.salt, ROUNDS, 32, 'sha256'), sealed.pinNonce, inner)).toEqual(Buffer.from(secret))
  })
  it('never uses a salt or a nonce twice', async () => {
    const made = await Promise.all([makeKey(PERSON, 'A', '407152', ROUNDS), makeKey(PERSON, 'A', '407152', ROUNDS)])
    const once = made.flatMap(({ kept: { sealed } }) => [sealed.salt, sealed.pinNonce, sealed.deviceNonce]).map(part => Buffer.from(part).toString('hex'))
    expect(new Set(once).size).toBe(6)
  })
})

async function shelfWith(kept: KeptKey) {
  const here = shelf()
  await keepKey(kept, here)
  return here
}

describe('trying a PIN', () => {
  it('counts wrong ones on the disk, before the answer is known', async () => {
    const { here } = await enrolled()
    here.writes.length = 0
    expect(await openWithPin(PERSON, '111222', 1000, here)).toEqual({ key: null, wrong: 1, wait: 0 })
    expect(here.writes.map(key => (key as PinKey).tries)).toEqual([{ wrong: 1, lastAt: 1000 }])
  })
  it('waits longer and longer, lets not even the right PIN in meanwhile, and forgives after a right one', async () => {
    const { here } = await enrolled()
    for (const at of [0, 1, 2]) await openWithPin(PERSON, '111222', at, here)
    expect(triesOf(here)).toEqual({ wrong: 3, lastAt: 2 })
    expect(await openWithPin(PERSON, '407152', 10_002, here)).toEqual({ key: null, wrong: 3, wait: 5000 })
    expect(await openWithPin(PERSON, '111222', 15_002, here)).toEqual({ key: null, wrong: 4, wait: 30_000 })
    expect((await openWithPin(PERSON, '407152', 45_002, here)).key).not.toBeNull()
    expect(triesOf(here)).toEqual({ wrong: 0, lastAt: 0 })
  })
  it('wipes nothing, however often it was wrong', async () => {
    const { here } = await enrolled()
    let now = 0
    for (let count = 0; count < 20; count += 1) {
      now += 2 * 3_600_000
      await openWithPin(PERSON, '111222', now, here)
    }
    expect(triesOf(here).wrong).toBe(20)
    expect((await openWithPin(PERSON, '407152', now + 3_600_000, here)).key).not.toBeNull()
  })
  it('of two tabs at once counts both', async () => {
    const { here } = await enrolled()
    await Promise.all([openWithPin(PERSON, '111222', 0, here), openWithPin(PERSON, '333444', 0, here)])
    expect(triesOf(here).wrong).toBe(2)
  })
  it('says when the storage is damaged, rather than that the PIN is wrong', async () => {
    const { kept } = await enrolled()
    const here = await shelfWith({ ...kept, deviceKey: await makeDeviceKey() })
    await expect(openWithPin(PERSON, '407152', 0, here)).rejects.toBeInstanceOf(KeyDamaged)
  })
  it('finds no key of another person', async () => {
    const { here } = await enrolled()
    await expect(openWithPin('22222222-2222-4222-8222-222222222222', '407152', 0, here)).rejects.toThrow('no signing key')
  })
})

describe('a key of before PINs', () => {
  it('is told from one with a PIN, and still signs', async () => {
    const pair = await crypto.subtle.generateKey('Ed25519', false, ['sign', 'verify']) as CryptoKeyPair
    const publicKey = Buffer.from(await crypto.subtle.exportKey('raw', pair.publicKey)).toString('base64url')
    const old = { person: PERSON, device: 'd', name: 'Phone', publicKey, enrolledAt: '', privateKey: pair.privateKey }
    const here = await shelfWith(old)
    const found = (await keptKey(PERSON, here))!
    expect(hasPin(found)).toBe(false)
    if (!hasPin(found)) expect(isSignedBy(publicKey, await plainUnlocked(found).sign(bytes))).toBe(true)
    await expect(openWithPin(PERSON, '407152', 0, here)).rejects.toThrow('no signing key with a PIN')
  })
})
