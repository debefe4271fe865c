import { ref, shallowRef } from 'vue'
import { encodeSignature } from '~/utils/photos'

/** A drawn signature on its way into an entry: kept on this device, named by its hash. */
export function useDrawing() {
  const run = useRun()
  const drawing = shallowRef<Blob | null>(null)
  const missing = ref('')

  /** The hash of the drawing, or null with a word about what is missing. */
  async function keep(): Promise<string | null> {
    missing.value = drawing.value === null ? 'Draw your signature, or type your name.' : ''
    if (drawing.value === null) return null
    const { sha256, blob } = await encodeSignature(drawing.value)
    await run.attach(sha256, blob)
    return sha256
  }

  return { drawing, missing, keep }
}
