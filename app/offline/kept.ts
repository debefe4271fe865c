import { uuidv7 } from '~~/shared/record/uuid'
import { pushEntries } from '~/queries/entries'
import { seenStore } from './checkpoints'
import { browserLocks } from './locks'
import { createOutbox } from './outbox'
import { Unsent } from './outbox-ports'
import type { Send } from './outbox-ports'
import type { Outbox } from './outbox'
import { outboxStore } from './outbox-store'

const CHANNEL = 'holdover-kept'
type Listener = (outage: string) => void

let outbox: Outbox | null = null
let channel: BroadcastChannel | null = null
const listeners = new Set<Listener>()

/** The outbox of this browser: one for all screens of a tab. */
export function keptOutbox(): Outbox {
  outbox ??= createOutbox({ store: outboxStore, send: pushUnlessParted, locks: browserLocks(), now: Date.now, newId: uuidv7, changed: tellChanged })
  return outbox
}

/** Nothing is sent to build on a log that is not the one this device saw. */
const pushUnlessParted: Send = async (outage, entries) => {
  const seen = await seenStore.get(outage).catch(() => null)
  if (seen?.parting) throw new Unsent('other-log')
  return pushEntries(outage, entries, seen?.checkpoint ?? null)
}

/** Tells this tab's screens and the other tabs that what is kept of an outage has changed. */
export function tellChanged(outage: string): void {
  openChannel()?.postMessage(outage)
  for (const listener of listeners) listener(outage)
}

/** Hears of changes by this and every other tab; returns the way to stop. */
export function onKeptChange(listener: Listener): () => void {
  openChannel()
  listeners.add(listener)
  return () => listeners.delete(listener)
}

function openChannel(): BroadcastChannel | null {
  if (channel === null && 'BroadcastChannel' in globalThis) {
    channel = new BroadcastChannel(CHANNEL)
    channel.onmessage = ({ data }) => { for (const listener of listeners) listener(String(data)) }
  }
  return channel
}
