import { spawn } from 'node:child_process'
import { fileURLToPath } from 'node:url'
import { setTimeout as sleep } from 'node:timers/promises'
import { isAlive, onClose, signal, waitUntilGone } from './processes.mjs'

const LEASH = fileURLToPath(new URL('leash.cjs', import.meta.url))

/**
 * @typedef {object} Running
 * @property {Promise<string>} ended its last words, once it has ended, whoever ended it
 * @property {() => Promise<void>} stop
 * @property {() => Promise<void>} kill as a power failure would: without a word
 */

/**
 * Starts a server program of Node, showing what it says and keeping its last words.
 * @param {string[]} args of node
 * @param {{ cwd: string, env: NodeJS.ProcessEnv, leash?: boolean, quiet?: boolean }} options
 *   leash: the server ends by itself when this process is killed; not for programs that use the channel themselves.
 *   quiet: keep the words without showing them
 * @returns {Running}
 */
export function startServer(args, { cwd, env, leash = true, quiet = false }) {
  // In a session of its own: Ctrl-C in the terminal reaches this process alone, which stops the server in its turn.
  const child = spawn(process.execPath, [...leash ? ['-r', LEASH] : [], ...args], {
    cwd, env, detached: true, stdio: ['ignore', 'pipe', 'pipe', ...leash ? ['ipc'] : []],
  })
  let words = []
  const keep = (chunk, out) => {
    if (!quiet) out.write(chunk)
    words = [...words, ...chunk.toString().split('\n')].filter(line => line.trim()).slice(-20)
  }
  child.stdout.on('data', chunk => keep(chunk, process.stdout))
  child.stderr.on('data', chunk => keep(chunk, process.stderr))
  const ended = new Promise((resolve) => {
    child.on('error', error => resolve(error.message))
    child.on('close', (code, by) => resolve([...words, by ? `(ended by ${by})` : `(exit code ${code})`].join('\n')))
  })
  async function stop() {
    if (!child.pid || !isAlive(child.pid)) return
    const target = leash ? child.pid : -child.pid
    signal(target, 'SIGTERM')
    if (!await waitUntilGone(child.pid, 10_000)) signal(target, 'SIGKILL')
    await ended
  }
  async function kill() {
    if (child.pid) signal(leash ? child.pid : -child.pid, 'SIGKILL')
    await ended
  }
  const forget = onClose(stop)
  void ended.then(forget)
  return { ended, stop, kill }
}

/**
 * Waits for a server to answer that it is ready.
 * @param {string} url of the health route
 * @param {Running} server
 * @param {number} [milliseconds]
 * @returns {Promise<{ ready: true } | { ready: false, words: string }>} the last words, or the last answer, when it is not
 */
export async function waitForHealth(url, server, milliseconds = 120_000) {
  const deadline = Date.now() + milliseconds
  let lastAnswer = 'no answer'
  let words = null
  void server.ended.then(last => words = last)
  while (Date.now() < deadline) {
    if (words !== null) return { ready: false, words }
    try {
      const response = await fetch(url, { signal: AbortSignal.timeout(5_000) })
      const text = await response.text()
      if (response.ok && JSON.parse(text).status === 'ok') return { ready: true }
      lastAnswer = `${response.status} ${text.slice(0, 200)}`
    } catch (error) {
      lastAnswer = error.cause?.code ?? error.message
    }
    await sleep(100)
  }
  return { ready: false, words: `${url} was not ready after ${milliseconds / 1000} s; its last answer was: ${lastAnswer}` }
}
