import { spawn, spawnSync } from 'node:child_process'
import { readFileSync } from 'node:fs'
import { setTimeout as sleep } from 'node:timers/promises'

/** What must be closed before this process ends, in the order in which it was opened. */
const closers = []
let closing = null

/**
 * Remembers how to close something that was opened; the last opened is closed first.
 * @param {() => unknown} close may be async
 * @returns {() => void} forgets it again, once it has closed by itself
 */
export function onClose(close) {
  closers.push(close)
  return () => {
    const place = closers.indexOf(close)
    if (place >= 0) closers.splice(place, 1)
  }
}

/** Closes all that is open, once, however often it is asked. */
export function closeAll() {
  closing ??= (async () => {
    while (closers.length > 0) {
      const close = closers.pop()
      try {
        await close()
      } catch (error) {
        process.stderr.write(`${error instanceof Error ? error.message : error}\n`)
      }
    }
  })()
  return closing
}

/** True from the first call of `closeAll`. */
export function isClosing() {
  return closing !== null
}

/**
 * Ends this process in order at Ctrl-C, at a polite kill, when the terminal goes away, and when npm, having
 * started this process, is killed above it.
 * @param {number} code exit code
 * @param {() => void} [before] said first
 */
export function closeOnSignals(code, before = () => {}) {
  async function end() {
    // A terminal and npm may both pass the same Ctrl-C on: the second finds the work begun.
    if (isClosing()) return
    before()
    await closeAll()
    process.exit(code)
  }
  for (const name of ['SIGINT', 'SIGTERM', 'SIGHUP']) process.on(name, end)
  if (process.env.npm_lifecycle_event) {
    const parent = process.ppid
    setInterval(() => process.ppid !== parent && end(), 500).unref()
  }
}

/**
 * Runs a program to its end, in a group of its own, so that ending it ends what it started.
 * @param {string} command
 * @param {string[]} args
 * @param {{ cwd?: string, env?: NodeJS.ProcessEnv, uid?: number, gid?: number, quiet?: boolean, timeout?: number }} [options]
 *   quiet: keep the output instead of showing it; timeout: milliseconds
 * @returns {Promise<{ code: number, output: string, timedOut: boolean }>} code 127 when the program is not there
 */
export async function run(command, args, options = {}) {
  const { quiet = false, timeout, ...rest } = options
  const child = spawn(command, args, { ...rest, detached: true, stdio: ['ignore', quiet ? 'pipe' : 'inherit', quiet ? 'pipe' : 'inherit'] })
  let output = ''
  let timedOut = false
  child.stdout?.on('data', chunk => output += chunk)
  child.stderr?.on('data', chunk => output += chunk)
  const forget = onClose(() => endGroup(child.pid))
  const timer = timeout && setTimeout(() => {
    timedOut = true
    void endGroup(child.pid)
  }, timeout)
  const code = await new Promise((resolve) => {
    child.on('error', (error) => {
      output += error.message
      resolve(127)
    })
    child.on('close', (exit, signal) => resolve(exit ?? (signal ? 128 : 1)))
  })
  clearTimeout(timer)
  forget()
  return { code, output, timedOut }
}

/** Runs a short program and answers its output, or null when it fails. */
export function ask(command, args, options = {}) {
  const answer = spawnSync(command, args, { encoding: 'utf8', stdio: ['ignore', 'pipe', 'ignore'], ...options })
  return answer.status === 0 ? answer.stdout.trim() : null
}

/** Ends a group of processes by the id of its leader: politely, and after five seconds for certain. */
async function endGroup(leader) {
  if (!leader) return
  signal(-leader, 'SIGTERM')
  if (!await waitUntilGone(leader, 5_000)) signal(-leader, 'SIGKILL')
}

/**
 * Sends a signal; a process that is gone already is no fault.
 * @returns {boolean} whether it was there
 */
export function signal(pid, name) {
  try {
    process.kill(pid, name)
    return true
  } catch {
    return false
  }
}

/** Whether a process runs; one that has ended and waits to be collected does not. */
export function isAlive(pid) {
  if (!signal(pid, 0)) return false
  return statusFields(pid)?.[0] !== 'Z'
}

/** Waits for a process to end. @returns {Promise<boolean>} false when it still runs after `milliseconds` */
export async function waitUntilGone(pid, milliseconds) {
  const deadline = Date.now() + milliseconds
  while (isAlive(pid)) {
    if (Date.now() > deadline) return false
    await sleep(50)
  }
  return true
}

/** The command line of a process, words parted by spaces; empty when it cannot be read. */
export function commandOf(pid) {
  try {
    return readFileSync(`/proc/${pid}/cmdline`, 'utf8').replaceAll('\0', ' ').trim()
  } catch {
    return ask('ps', ['-p', String(pid), '-o', 'command=']) ?? ''
  }
}

/** When a process began, as the system tells it: with its id it names one process for good. */
export function birthOf(pid) {
  return statusFields(pid)?.[19] ?? ask('ps', ['-p', String(pid), '-o', 'lstart=']) ?? ''
}

/** The fields of /proc/<pid>/stat from the state on, or null where there is no such file. */
function statusFields(pid) {
  try {
    const text = readFileSync(`/proc/${pid}/stat`, 'utf8')
    return text.slice(text.lastIndexOf(')') + 2).split(' ')
  } catch {
    return null
  }
}
