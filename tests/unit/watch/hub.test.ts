// Rules of this project; the form of an event is WHATWG HTML, 9.2 (server-sent events).
import { describe, expect, it } from 'vitest'
import { event, WAITING_MAX, WatchHub } from '../../../server/utils/watch/hub'
import type { Watcher } from '../../../server/utils/watch/hub'

function watcherOf(person: string, sites: string[] | null, drains = true): { watcher: Watcher, told: string[], end: () => string } {
  const told: string[] = []
  let [waits, end] = [0, 'open']
  return {
    told,
    end: () => end,
    watcher: { person, sessionVersion: 1, sites: sites && new Set(sites), outlet: {
      write: (text) => { told.push(text); if (!drains) waits += text.length },
      waiting: () => waits,
      end: () => { end = 'ended' },
      drop: () => { end = 'dropped' },
    } },
  }
}

const wake = { outage: 'an outage', seq: 7, phase: 'dark' } as const

describe('wake-ups', () => {
  it('go to those alone who may see the site', () => {
    const hub = new WatchHub()
    const [here, elsewhere, all] = [watcherOf('ada', ['mill']), watcherOf('bram', ['abbot']), watcherOf('ines', null)]
    for (const { watcher } of [here, elsewhere, all]) hub.add(watcher)
    hub.wake('mill', wake)
    expect([here.told, elsewhere.told, all.told]).toEqual([[event('wake', wake)], [], [event('wake', wake)]])
    expect(here.told[0]).toBe('event: wake\ndata: {"outage":"an outage","seq":7,"phase":"dark"}\n\n')
  })

  it('drop a reader once more than 64 KB wait for it, and no other', () => {
    const hub = new WatchHub()
    const [stalled, reads] = [watcherOf('ada', null, false), watcherOf('bram', null)]
    hub.add(stalled.watcher)
    hub.add(reads.watcher)
    const count = Math.floor(WAITING_MAX / event('wake', wake).length)
    for (let sent = 0; sent < count; sent++) hub.wake('mill', wake)
    expect([stalled.end(), hub.size]).toEqual(['open', 2])
    hub.wake('mill', wake)
    expect([stalled.end(), reads.end(), hub.size]).toEqual(['dropped', 'open', 1])
    hub.beat(1_000)
    expect([stalled.told.length, reads.told.length]).toEqual([count + 1, count + 2])
  })
})

describe('accounts of those who watch', () => {
  const access = (sites: string[] | null, sessionVersion = 1) => ({ sessionVersion, sites })

  it.each([
    ['nothing has changed', new Map([['ada', access(['mill', 'quarry'])]]), 'open'],
    ['the account is switched off', new Map(), 'ended'],
    ['every session was ended', new Map([['ada', access(['quarry', 'mill'], 2)]]), 'ended'],
    ['a site was taken away', new Map([['ada', access(['mill'])]]), 'ended'],
    ['a site was added', new Map([['ada', access(['mill', 'quarry', 'abbot'])]]), 'ended'],
    ['a site was changed for another', new Map([['ada', access(['mill', 'abbot'])]]), 'ended'],
    ['they may see all by now', new Map([['ada', access(null)]]), 'ended'],
  ])('where %s', (_what, now, end) => {
    const hub = new WatchHub()
    const { watcher, end: ended } = watcherOf('ada', ['quarry', 'mill'])
    hub.add(watcher)
    expect(hub.people()).toEqual(['ada'])
    hub.check(now)
    expect([ended(), hub.size]).toEqual([end, end === 'open' ? 1 : 0])
  })
})
