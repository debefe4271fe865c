import type { KeptFile } from './database'
import { openKept, STRICT } from './database'
import { browserLocks } from './locks'

/** Keeps a photo or drawing until the server holds it. */
export async function keepFile(file: KeptFile): Promise<void> {
  const tx = (await openKept()).transaction('files', 'readwrite', STRICT)
  await tx.store.put(file)
  await tx.done
}

/** Files of a person that the server does not hold yet, of one outage or of all. */
export async function keptFiles(person: string, outage?: string): Promise<KeptFile[]> {
  const database = await openKept()
  const found = outage === undefined ? await database.getAll('files') : await database.getAllFromIndex('files', 'outage', outage)
  return found.filter(file => file.person === person)
}

export type PutFile = (outage: string, sha256: string, blob: Blob) => Promise<'held' | 'later' | { refused: string }>

/** Sends the files of an outage; one leaves once the server holds it. One that it refuses stays, with the reason. */
export async function drainFiles(outage: string, person: string, put: PutFile): Promise<void> {
  await browserLocks().run(`holdover-files-${outage}`, async () => {
    for (const file of await keptFiles(person, outage)) {
      if (file.refusal !== undefined) continue
      const answer = await put(outage, file.sha256, file.blob)
      const database = await openKept()
      if (answer === 'held') await database.delete('files', file.sha256)
      else if (answer !== 'later') await database.put('files', { ...file, refusal: answer.refused })
    }
  })
}

/** The person has seen that the server will not have a file: it leaves this device. */
export async function dismissFile(sha256: string): Promise<void> {
  await (await openKept()).delete('files', sha256)
}
