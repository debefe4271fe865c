// Over real connections: what the two ends of one hold in the system's own buffers is not counted, so much is sent.
import type { Server } from 'node:http'
import { createServer } from 'node:http'
import type { AddressInfo, Socket } from 'node:net'
import { connect } from 'node:net'
import { afterEach, expect, it } from 'vitest'
import { event, WatchHub } from '../../../server/utils/watch/hub'
import type { Watcher } from '../../../server/utils/watch/hub'
import { outletOf } from '../../../server/utils/watch/outlet'

const SITE = 'site'
/** Bytes of one wake-up, and how many are written in one turn: less than may wait. */
const [BYTES, A_TURN] = [4_000, 8]
/** Far more than a system keeps for one connection. */
const MOST_TURNS = 4_000

let server: Server
const sockets: Socket[] = []
afterEach(() => {
  for (const socket of sockets.splice(0)) socket.destroy()
  server.close()
})

const turn = () => new Promise(resolve => setImmediate(resolve))

async function watch(port: number): Promise<Socket> {
  const socket = connect(port, '127.0.0.1')
  sockets.push(socket)
  socket.write('GET / HTTP/1.1\r\nHost: watch\r\n\r\n')
  await new Promise(resolve => socket.once('data', resolve))
  return socket
}

it('drops a reader that stalls, and goes on with one that reads', async () => {
  const hub = new WatchHub()
  server = createServer((_request, res) => {
    const watcher: Watcher = { person: 'ines', sessionVersion: 1, sites: null, outlet: outletOf(res) }
    res.on('close', () => hub.remove(watcher))
    res.writeHead(200).write('hello')
    hub.add(watcher)
  })
  await new Promise<void>(resolve => server.listen(0, '127.0.0.1', resolve))
  const { port } = server.address() as AddressInfo
  const stalled = await watch(port)
  stalled.pause()
  const reader = await watch(port)
  let last = ''
  reader.on('data', (part: Buffer) => { last = `${last}${part.toString()}`.slice(-2 * BYTES) })

  let turns = 0
  while (hub.size === 2 && turns++ < MOST_TURNS) {
    for (let wake = 0; wake < A_TURN; wake++) hub.wake(SITE, { outage: 'x'.repeat(BYTES), seq: turns, phase: 'dark' })
    await turn()
  }
  expect(hub.size).toBe(1)
  const final = { outage: 'the last', seq: 1, phase: 'dark' } as const
  hub.wake(SITE, final)
  for (let waited = 0; !last.includes('the last') && waited < 5_000; waited++) await turn()
  expect(last).toContain(event('wake', final))
})
