/** Largest file, bytes, and longest side of a picture, pixels; the phone keeps to them and the server asks for them. */
export const FILE_MAX_BYTES = 10_000_000
export const SIDE_MAX = 2048

/** The size at which a picture is kept: its longest side at most `SIDE_MAX`, never enlarged. */
export function keptSize(width: number, height: number): { width: number, height: number } {
  const share = Math.min(1, SIDE_MAX / Math.max(width, height))
  return { width: Math.max(1, Math.round(width * share)), height: Math.max(1, Math.round(height * share)) }
}
