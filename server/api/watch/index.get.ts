import { requirePerson } from '~~/server/utils/access'
import { useDatabase } from '~~/server/utils/database'
import { unauthenticated } from '~~/server/utils/errors'
import { event as streamed } from '~~/server/utils/watch/hub'
import type { Watcher } from '~~/server/utils/watch/hub'
import { readAccess, useWatchHub } from '~~/server/utils/watch/listen'
import { outletOf } from '~~/server/utils/watch/outlet'

/** After so long a browser tries again, ms; each a little otherwise, so that not all come at once. */
const retry = () => 1000 + Math.floor(Math.random() * 2000)

/** Wake-ups of the outages that the person may see, as server-sent events; what changed is pulled. */
export default defineEventHandler(async (event) => {
  const person = requirePerson(event)
  const access = (await readAccess(useDatabase(), [person.id])).get(person.id)
  // Signed out between the guard and here.
  if (!access || access.sessionVersion !== event.context.sessionVersion) return unauthenticated()
  const hub = useWatchHub()
  const { res } = event.node
  const watcher: Watcher = {
    person: person.id, sessionVersion: access.sessionVersion, sites: access.sites && new Set(access.sites),
    outlet: outletOf(res),
  }
  res.on('close', () => hub.remove(watcher))
  res.writeHead(200, { 'content-type': 'text/event-stream', 'cache-control': 'no-store, no-transform', 'x-accel-buffering': 'no' })
  res.write(`retry: ${retry()}\n${streamed('beat', { now: Date.now() })}`)
  hub.add(watcher)
})
