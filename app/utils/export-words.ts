import { countWords, numberWords } from '~~/shared/charts/words'
import { EXPORT_DAYS } from '~~/shared/schemas/exports'
import type { ExportItem } from '~~/shared/schemas/exports'

/** Bytes as people say them: '640 bytes', '12 kB', '4.2 MB'. */
export function byteWords(bytes: number): string {
  if (bytes < 1000) return countWords(bytes, 'byte')
  return bytes < 1_000_000 ? `${numberWords(bytes / 1000, 0)} kB` : `${numberWords(bytes / 1_000_000)} MB`
}

/** How an export stands, in a sentence. @param when says a moment in words */
export function exportWords(item: ExportItem, when: (iso: string) => string): string {
  switch (item.state) {
    case 'waiting': return 'Waits for its turn.'
    case 'working': return item.done < item.total ? `${item.done} of ${countWords(item.total, 'record')} done.` : 'All records are done; the file is being closed.'
    case 'done': return `${byteWords(item.bytes ?? 0)}, kept until ${when(item.expiresAt!)}.`
    case 'failed': return `It failed: ${item.fault ?? 'nobody knows why'}.`
    case 'cancelled': return 'Cancelled.'
    case 'expired': return `The file is not kept any more: it was there for ${EXPORT_DAYS} days, or was taken away.`
  }
}
