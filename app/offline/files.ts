import type { KeptFile } from './database'
import { openKept, STRICT } from './database'

/** Keeps a photo or drawing until the server holds it. */
export async function keepFile(file: KeptFile): Promise<void> {
  const tx = (await openKept()).transaction('files', 'readwrite', STRICT)
  await tx.store.put(file)
  await tx.done
}

export async function keptFiles(outage: string, person: string): Promise<KeptFile[]> {
  return (await (await openKept()).getAllFromIndex('files', 'outage', outage)).filter(file => file.person === person)
}

/** Sends what is kept; a file leaves once the server holds it, or has refused it for good. */
export async function drainFiles(outage: string, person: string, put: (file: KeptFile) => Promise<'held' | 'later'>): Promise<void> {
  await navigator.locks.request(`holdover-files-${outage}`, async () => {
    for (const file of await keptFiles(outage, person)) {
      if (await put(file) === 'held') await (await openKept()).delete('files', file.sha256)
    }
  })
}
