import { createServer } from 'node:net'
import { setTimeout as sleep } from 'node:timers/promises'
import { Refusal } from './say.mjs'

/**
 * Tries to listen, and lets go again.
 * @param {number} port 0 for any
 * @param {string} host
 * @returns {Promise<{ port: number } | { fault: string }>} the port, or the system's word for why not
 */
export function tryPort(port, host = '127.0.0.1') {
  return new Promise((resolve) => {
    const server = createServer()
    server.once('error', error => resolve({ fault: error.code ?? error.message }))
    server.listen({ port, host, exclusive: true }, () => {
      const address = server.address()
      server.close(() => resolve({ port: address.port }))
    })
  })
}

/** A free port of this machine's loopback, chosen by the system. */
export async function anyFreePort() {
  const answer = await tryPort(0)
  if ('fault' in answer) throw new Refusal(`No port of 127.0.0.1 could be opened (${answer.fault}).`)
  return answer.port
}

/**
 * The first free port from one on, below the range that systems hand out for outgoing connections.
 * @param {number} first
 */
export async function freePortFrom(first) {
  for (let port = first; port < first + 400; port += 1) {
    if ('port' in await tryPort(port)) return port
  }
  return anyFreePort()
}

/**
 * Reads and tries the address that the server shall listen at.
 * @param {string} host
 * @param {string} text the port as given
 * @returns {Promise<number>}
 * @throws {Refusal} with the reason in a sentence
 */
export async function claimPort(host, text) {
  const port = Number(text)
  if (!/^\d+$/.test(text) || port < 1 || port > 65_535) {
    throw new Refusal(`PORT is ${JSON.stringify(text)}; it must be a whole number from 1 to 65535.`)
  }
  // A server whose start command was killed a moment ago may still be letting go.
  const deadline = Date.now() + 3_000
  for (;;) {
    const answer = await tryPort(port, host)
    if ('port' in answer) return port
    if (answer.fault !== 'EADDRINUSE' || Date.now() > deadline) throw new Refusal(explain(answer.fault, host, port))
    await sleep(150)
  }
}

function explain(fault, host, port) {
  if (fault === 'EADDRINUSE') return `Port ${port} of ${host} is taken by another program. Stop that program, or choose another port: PORT=${port + 1} npm start.`
  if (fault === 'EACCES') return `Port ${port} needs rights that this user lacks. Choose one above 1023: PORT=3000 npm start.`
  if (fault === 'EADDRNOTAVAIL' || fault === 'ENOTFOUND') return `HOST is ${host}, which is no address of this machine.`
  return `Port ${port} of ${host} cannot be opened (${fault}).`
}
