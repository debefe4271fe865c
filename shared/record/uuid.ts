/**
 * A UUIDv7 (RFC 9562, 5.7): 48 bits of Unix milliseconds, then random bits.
 * @param now Unix time, ms
 */
export function uuidv7(now: number): string {
  const bytes = crypto.getRandomValues(new Uint8Array(16))
  for (let index = 0; index < 6; index++) bytes[index] = Math.floor(now / 2 ** (8 * (5 - index))) % 256
  bytes[6] = 0x70 | (bytes[6]! & 0x0F)
  bytes[8] = 0x80 | (bytes[8]! & 0x3F)
  const hex = Array.from(bytes, byte => byte.toString(16).padStart(2, '0')).join('')
  return `${hex.slice(0, 8)}-${hex.slice(8, 12)}-${hex.slice(12, 16)}-${hex.slice(16, 20)}-${hex.slice(20)}`
}
