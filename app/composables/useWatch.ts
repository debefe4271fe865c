import type { InjectionKey, Ref } from 'vue'
import { computed, inject, onMounted, onScopeDispose, provide, readonly, ref, shallowReactive, shallowRef } from 'vue'
import type { WatchAnswer, WatchOutage, WatchWake } from '~~/shared/schemas/watch'
import { WATCH_ASKED_MAX } from '~~/shared/schemas/watch'
import { useNow } from '~/composables/useNow'
import { fetchWatch } from '~/queries/watch'
import { readFault } from '~/utils/api-error'
import type { ApiFault } from '~/utils/api-error'

/** How often all is asked for: while wake-ups come, and while they do not, ms. */
const LIVE_MS = 60_000
const POLL_MS = 10_000
/** A stream that said nothing for so long is taken for dead: its server says that it lives every 15 s, ms. */
const DEAD_MS = 40_000
/** A forecast is asked for anew after so long, though nothing was signed: it drifts with the time, ms. */
const DRIFT_MS = 55_000

export interface Watch {
  /** by id; each row changes by itself */
  rows: ReadonlyMap<string, WatchOutage>
  /** wake-ups come; else all is asked for every ten seconds */
  live: Readonly<Ref<boolean>>
  loaded: Readonly<Ref<boolean>>
  more: Readonly<Ref<boolean>>
  fault: Readonly<Ref<ApiFault | null>>
  /** when the server was last heard, Unix ms by its clock */
  heardAt: Readonly<Ref<number | null>>
  /** this device's clock less the server's, ms */
  skew: Readonly<Ref<number>>
  /** the server's time, renewed every second, Unix ms */
  now: Readonly<Ref<number>>
  /** the same, renewed every ten seconds: for what is drawn and not counted down */
  coarse: Readonly<Ref<number>>
  pullAll: () => Promise<void>
}

const KEY: InjectionKey<Watch> = Symbol('watch')

/** The watch whose page this component stands on. */
export function useWatch(): Watch {
  const watch = inject(KEY)
  if (!watch) throw new Error('useWatch outside the watch')
  return watch
}

/**
 * All outages that the person may see, live: wake-ups say what has changed and it is pulled. Where they do not come
 * all is asked for now and then; a stream that comes back is followed by a pull of all, so that nothing is lost.
 */
export function provideWatch(): Watch {
  const rows = shallowReactive(new Map<string, WatchOutage>())
  /** when each row was summed up, Unix ms by the server's clock */
  const summedAt = new Map<string, number>()
  const [live, loaded, more] = [ref(false), ref(false), ref(false)]
  const fault = shallowRef<ApiFault | null>(null)
  const heardAt = ref<number | null>(null)
  const skew = ref(0)
  const now = useNow(skew)
  const coarse = computed(() => Math.floor(now.value / 10_000) * 10_000)
  let woken = new Set<string>()
  let allWanted = false
  let pulling: Promise<void> | null = null
  let source: EventSource | null = null
  let spokeAt = 0
  let [closed, askedAt] = [false, 0]
  let timer: ReturnType<typeof setInterval> | undefined

  function take(answer: WatchAnswer, asked: readonly string[] | null): void {
    const here = new Set(answer.ids)
    for (const item of answer.items) {
      if (item.seq < (rows.get(item.id)?.seq ?? 0)) continue
      rows.set(item.id, item)
      summedAt.set(item.id, answer.now)
    }
    for (const id of asked ?? [...rows.keys()]) if (!here.has(id)) { rows.delete(id); summedAt.delete(id) }
    if (asked === null) { loaded.value = true; more.value = answer.more }
  }

  async function pull(only: string[] | null): Promise<void> {
    const before = Date.now()
    const drifted = (row: WatchOutage) => row.phase === 'dark' && before - skew.value - (summedAt.get(row.id) ?? 0) > DRIFT_MS
    const known = [...rows.values()].filter(row => only === null ? !drifted(row) : only.includes(row.id))
    try {
      const answer = await fetchWatch(Object.fromEntries(known.map(row => [row.id, row.seq])), only ?? undefined)
      if (closed) return
      skew.value = Math.round((before + Date.now()) / 2 - answer.now)
      heardAt.value = answer.now
      take(answer, only)
      fault.value = null
    } catch (error) {
      fault.value = readFault(error)
      // What was asked for is still wanted; the next turn asks for all.
      askedAt = Date.now() - (live.value ? LIVE_MS - POLL_MS : 0)
    }
  }

  /** Pulls what is wanted, one request after the other: what wakes up meanwhile goes into the next. */
  function run(): Promise<void> {
    pulling ??= (async () => {
      while (!closed && (allWanted || woken.size > 0)) {
        const ids = [...woken].slice(0, WATCH_ASKED_MAX)
        const all = allWanted
        if (all) { woken = new Set(); allWanted = false; askedAt = Date.now() } else for (const id of ids) woken.delete(id)
        await pull(all ? null : ids)
      }
    })().finally(() => { pulling = null })
    return pulling
  }

  function pullAll(): Promise<void> {
    allWanted = true
    return run()
  }

  function listen(): void {
    source?.close()
    spokeAt = Date.now()
    const opened = source = new EventSource('/api/watch')
    const spoke = () => { spokeAt = Date.now(); heardAt.value = Date.now() - skew.value }
    opened.addEventListener('beat', () => {
      spoke()
      if (live.value) return
      live.value = true
      void pullAll()
    })
    opened.addEventListener('again', () => { spoke(); void pullAll() })
    opened.addEventListener('wake', (event) => {
      spoke()
      const { outage, seq } = JSON.parse((event as MessageEvent<string>).data) as WatchWake
      if ((rows.get(outage)?.seq ?? 0) >= seq) return
      woken.add(outage)
      void run()
    })
    opened.onerror = () => { live.value = false }
  }

  /** Every second or so: a stream that is dead or was refused is opened anew, and all is asked for when it is time. */
  function turn(): void {
    const silent = Date.now() - spokeAt
    if (silent > DEAD_MS || (source?.readyState === EventSource.CLOSED && silent > POLL_MS)) {
      live.value = false
      listen()
    }
    if (Date.now() - askedAt >= (live.value ? LIVE_MS : POLL_MS)) void pullAll()
  }

  const online = () => { listen(); void pullAll() }
  onMounted(() => {
    listen()
    void pullAll()
    timer = setInterval(turn, 1000)
    window.addEventListener('online', online)
  })
  onScopeDispose(() => {
    closed = true
    clearInterval(timer)
    source?.close()
    if (import.meta.client) window.removeEventListener('online', online)
  })

  const watch: Watch = { rows, live: readonly(live), loaded: readonly(loaded), more: readonly(more), fault, heardAt: readonly(heardAt), skew: readonly(skew), now, coarse, pullAll }
  provide(KEY, watch)
  return watch
}
