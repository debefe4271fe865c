/** Makes the paper of a record in a process of its own, whose time and peak memory are its own too. */
import { execFile } from 'node:child_process'
import { join } from 'node:path'
import { fileURLToPath } from 'node:url'
import { promisify } from 'node:util'
import { bundle } from '../../scripts/lib/bundle.mjs'

const run = promisify(execFile)
const root = fileURLToPath(new URL('../..', import.meta.url)).replace(/\/$/, '')

/** @property peakMb most memory that the process held at once, MiB */
export interface PaperRun { pages: number, bytes: number, ms: number, peakMb: number }

/** Gives a function that makes the paper of a record.json, or `bare` text of the same words. */
export async function paperProcess(): Promise<(path: string, how?: 'bare') => Promise<PaperRun>> {
  const program = await bundle(root, 'bench/paper-process.ts', join(root, 'node_modules/.cache/holdover-paper'))
  return async (path, how) => {
    const { stdout } = await run(process.execPath, [program, path, ...(how ? [how] : [])])
    return JSON.parse(stdout) as PaperRun
  }
}
