import type { Checkpoint } from '~~/shared/record/checkpoint'
import type { StoredEntry } from '~~/shared/record/entry'
import type { OutboxEntry } from '~/offline/outbox-ports'

/** What this phone keeps of an outage, as a file (docs/record-format.md, *Entries kept on a phone*). */
export interface KeptFileContent {
  format: 'holdover-kept-entries'
  version: 1
  outage: string
  /** the checkpoint that this phone last saw; null where it saw none */
  seen: Checkpoint | null
  /** signed here, and not in the record as far as this phone knows */
  entries: Pick<OutboxEntry, 'entry' | 'signature' | 'keptAt'>[]
  /** the log as this phone holds it, with what the server added; only where it parted from the server's */
  log?: StoredEntry[]
}

export function keptFile(outage: string, kept: readonly OutboxEntry[], seen: Checkpoint | null, log?: readonly StoredEntry[]): KeptFileContent {
  return { format: 'holdover-kept-entries', version: 1, outage, seen, entries: kept.map(({ entry, signature, keptAt }) => ({ entry, signature, keptAt })), ...log ? { log: [...log] } : {} }
}

/** Gives a file to the browser to save. @param name of the file */
export function saveJson(content: object, name: string): void {
  const link = document.createElement('a')
  link.href = URL.createObjectURL(new Blob([JSON.stringify(content, null, 1)], { type: 'application/json' }))
  link.download = name
  link.click()
  setTimeout(() => URL.revokeObjectURL(link.href), 10_000)
}
