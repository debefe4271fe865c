import { computed, onMounted, ref, shallowRef } from 'vue'
import { navigateTo } from '#imports'
import type { Checkpoint } from '~~/shared/record/checkpoint'
import { follow } from '~~/shared/record/checkpoint'
import type { StoredEntry } from '~~/shared/record/entry'
import { foldLog } from '~~/shared/record/fold'
import { EMPTY_FRONTIER } from '~~/shared/record/merkle'
import { leaveSeen } from '~/offline/checkpoints'
import { keptOutbox } from '~/offline/kept'
import { keptLog } from '~/offline/logs'
import type { Lost } from '~/offline/other-log'
import { lostOf, otherLogWords, takeLog } from '~/offline/other-log'
import { fetchEntries } from '~/queries/entries'
import { NotUnlocked } from '~/stores/signer'
import { useRun } from '~/composables/useRun'
import { readFault } from '~/utils/api-error'

interface Given { entries: StoredEntry[], checkpoint: Checkpoint | null, heardAt: number }

/** The way back after the database was restored: this phone goes on from the log that the server gives now, and says so in it. */
export function useOtherLog() {
  const { id, person, parting, signer, skew } = useRun()
  const held = shallowRef<StoredEntry[]>([])
  const given = shallowRef<Given | null>(null)
  const lost = shallowRef<Lost | null>(null)
  const trouble = ref('')
  const busy = ref(false)
  const done = ref(false)
  const seen = computed(() => parting.value?.checkpoint ?? null)

  /** Reads the whole log of the server, and holds this phone's against it. */
  async function read(): Promise<void> {
    trouble.value = ''
    if (!signer.loaded) await signer.load(person.id)
    const device = signer.device?.id
    if (!device) { trouble.value = 'This browser is not enrolled to sign for you.'; return }
    try {
      held.value = (await keptLog(id, person.id))?.entries ?? []
      const log = await fetchAll()
      // A log that is not what its own checkpoint says is no log to go on from.
      const own = log.checkpoint ? follow(EMPTY_FRONTIER, log.entries, [log.checkpoint]).parting : null
      given.value = log
      const found = lostOf(held.value, await keptOutbox().entries(id), log.entries, foldLog(id, log.entries).chain[device] ?? null, { person: person.id, device })
      lost.value = own ? { ...found, unfit: 'That log is not the one that its own checkpoint names' } : found
    } catch (error) {
      trouble.value = readFault(error).reason
    }
  }

  async function fetchAll(): Promise<Given> {
    const entries: StoredEntry[] = []
    for (;;) {
      const page = await fetchEntries(id, entries.length)
      entries.push(...page.entries)
      if (page.entries.length === 0 || entries.length >= page.size) return { entries, checkpoint: page.checkpoint, heardAt: Date.parse(page.now) }
    }
  }

  /** Takes that log, lets what it lacks wait again, and signs in it what was done and why. */
  async function goOn(reason: string): Promise<void> {
    const [log, found, before] = [given.value, lost.value, seen.value]
    if (busy.value || !log?.checkpoint || !found || found.unfit !== null || !before) return
    busy.value = true
    trouble.value = ''
    try {
      const key = await signer.unlocked('note-added')
      const { snapshot, code, phase, planned, size } = foldLog(id, log.entries)
      await takeLog({ id, person: person.id, size, heardAt: log.heardAt, code, phase, planned, site: snapshot.site.name, controller: snapshot.controller.name, timeZone: snapshot.site.timeZone }, log.entries, found, key.device)
      await keptOutbox().keep(key, id, 'note-added', { words: otherLogWords(before, log.entries.length, found.again.length, reason) }, skew.value, found.end)
      await leaveSeen(id, log.checkpoint)
      done.value = true
      // Everything in memory stands on the other log: the page is opened anew.
      await navigateTo(`/outages/${id}`, { external: true })
    } catch (error) {
      trouble.value = error instanceof NotUnlocked ? error.message : error instanceof Error ? error.message : String(error)
    }
    busy.value = false
  }

  onMounted(() => { if (parting.value) void read() })
  return { parting, seen, held, given, lost, trouble, busy, done, read, goOn }
}
