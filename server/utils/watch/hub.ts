import type { WatchWake } from '../../../shared/schemas/watch'

/** Bytes that may wait for a reader before it is dropped. */
export const WAITING_MAX = 65_536

/** The end of a stream in this server. */
export interface Outlet {
  write: (text: string) => void
  /** bytes written that have not left this process */
  waiting: () => number
  /** ends it in order */
  end: () => void
  /** ends it at once, whatever waits */
  drop: () => void
}

/** A person who watches. `sites`: those that they may see, null: all. */
export interface Watcher { person: string, sessionVersion: number, sites: ReadonlySet<string> | null, outlet: Outlet }

/** What the database says of a person who watches; null: they may no longer sign in. */
export interface Access { sessionVersion: number, sites: readonly string[] | null }

/** The streams of one server. Whoever does not read is dropped: their browser comes again and pulls what it lacks. */
export class WatchHub {
  private readonly watchers = new Set<Watcher>()

  get size(): number { return this.watchers.size }

  /** Persons who watch, each once. */
  people(): string[] { return [...new Set([...this.watchers].map(watcher => watcher.person))] }

  add(watcher: Watcher): void { this.watchers.add(watcher) }

  remove(watcher: Watcher): void { this.watchers.delete(watcher) }

  /** Tells those who may see its site that an outage has changed. */
  wake(site: string, wake: WatchWake): void {
    const text = event('wake', wake)
    for (const watcher of this.watchers) if (watcher.sites === null || watcher.sites.has(site)) this.send(watcher, text)
  }

  /** Tells everybody to pull all: wake-ups may have been lost. */
  pullAll(): void {
    for (const watcher of this.watchers) this.send(watcher, event('again', {}))
  }

  /** Says that the stream lives, and what time it is. @param now Unix ms */
  beat(now: number): void {
    for (const watcher of this.watchers) this.send(watcher, event('beat', { now }))
  }

  /** Ends the streams of those whose account or sites have changed. */
  check(access: ReadonlyMap<string, Access>): void {
    for (const watcher of this.watchers) {
      const now = access.get(watcher.person)
      if (now && now.sessionVersion === watcher.sessionVersion && sameSites(watcher.sites, now.sites)) continue
      this.watchers.delete(watcher)
      watcher.outlet.end()
    }
  }

  endAll(): void {
    for (const watcher of this.watchers) watcher.outlet.end()
    this.watchers.clear()
  }

  private send(watcher: Watcher, text: string): void {
    watcher.outlet.write(text)
    if (watcher.outlet.waiting() <= WAITING_MAX) return
    this.watchers.delete(watcher)
    watcher.outlet.drop()
  }
}

function sameSites(one: ReadonlySet<string> | null, other: readonly string[] | null): boolean {
  if (one === null || other === null) return one === null && other === null
  return one.size === other.length && other.every(site => one.has(site))
}

/** An event as the HTML standard's event streams write it (WHATWG HTML, 9.2 server-sent events). */
export function event(name: string, data: object): string {
  return `event: ${name}\ndata: ${JSON.stringify(data)}\n\n`
}
