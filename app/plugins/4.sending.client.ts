import type { Phase } from '~~/shared/record/phases'
import { drainFiles, keptFiles } from '~/offline/files'
import { keptOutbox, onKeptChange } from '~/offline/kept'
import { keepLog, keptOutages } from '~/offline/logs'
import { fetchEntries, putFile } from '~/queries/entries'
import { useSending } from '~/stores/sending'

/** Between attempts while something waits, ms: the last holds until all is sent, and an answer comes within 5 s of the network's return. */
const PAUSES_MS = [0, 1000, 2000, 4000]

/** Between attempts where only somebody can mend what stands in the way. */
const STUCK_MS = 30_000

const waitingFiles = async (person: string) => (await keptFiles(person).catch(() => [])).filter(file => file.refusal === undefined)

/**
 * Sends all that the person has kept, of whatever outage, wherever they are in Holdover: at once when
 * something is kept or the network comes back, and again and again while something waits.
 */
export default defineNuxtPlugin((nuxtApp) => {
  const outbox = keptOutbox()
  const sending = useSending()
  let timer: ReturnType<typeof setTimeout> | undefined
  let failures = 0
  let busy = false

  const read = () => outbox.entries().then((entries) => { sending.kept = entries }, () => undefined)

  async function send(): Promise<void> {
    clearTimeout(timer)
    if (busy) return
    busy = true
    await read()
    const { person } = sending
    if (person !== null && (sending.waiting.length > 0 || (await waitingFiles(person)).length > 0)) {
      const drained = await outbox.drainAll(person).catch(() => null)
      const troubles = [...drained ?? []].flatMap(([outage, { trouble }]) => trouble ? [[outage, trouble] as const] : [])
      sending.troubles = new Map(troubles)
      if (troubles.some(([, trouble]) => trouble === 'signed-out')) sending.session = 'ended'
      if (troubles.length === 0) await sendFiles(person)
      for (const [outage, { answers }] of drained ?? []) if (answers.size > 0) await readBack(outage, person).catch(() => undefined)
      await read()
    }
    busy = false
    const left = sending.waiting.length > 0 || (person !== null && (await waitingFiles(person)).length > 0)
    failures = left ? failures + 1 : 0
    const hopeful = [...sending.troubles.values()].every(trouble => trouble === 'away')
    if (left) timer = setTimeout(() => { void send() }, hopeful ? PAUSES_MS[Math.min(failures, PAUSES_MS.length - 1)] : STUCK_MS)
  }

  /** Reads the record of an outage back after sending, where its log is kept here: then the entries are seen to be in it. */
  async function readBack(outage: string, person: string): Promise<void> {
    const about = (await keptOutages(person)).find(held => held.id === outage)
    if (!about) return
    for (let size = about.size; ;) {
      const page = await fetchEntries(outage, size)
      size = page.entries.at(-1)?.seq ?? size
      await keepLog({ ...about, size, code: page.code, phase: page.phase as Phase, heardAt: Date.parse(page.now) }, page.entries)
      if (page.entries.length > 0 && size < page.size) continue
      return outbox.collect(outage, size)
    }
  }

  async function sendFiles(person: string): Promise<void> {
    const files = await waitingFiles(person)
    for (const outage of new Set(files.map(file => file.outage))) await drainFiles(outage, person, putFile).catch(() => undefined)
  }

  const again = () => {
    failures = 0
    void send()
  }
  nuxtApp.hook('app:mounted', () => {
    window.addEventListener('online', again)
    document.addEventListener('visibilitychange', () => { if (!document.hidden) again() })
    onKeptChange(() => { void read().then(() => { if (sending.waiting.length > 0 && !busy && failures === 0) again() }) })
    void send()
  })
})
