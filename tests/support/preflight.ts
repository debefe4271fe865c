/** Apache PDFBox Preflight, as Debian packs it: a validator of PDF/A-1b (ISO 19005-1). */
import { execFile } from 'node:child_process'
import { existsSync } from 'node:fs'
import { PREFLIGHT_JARS } from '../../scripts/lib/system.mjs'

/**
 * What Preflight finds at fault in a file; empty where it is valid PDF/A-1b.
 * @throws Error that names what is to be installed where Java or a jar is missing
 */
export async function preflightFaults(path: string): Promise<string> {
  const missing = Object.entries(PREFLIGHT_JARS).filter(([jar]) => !existsSync(jar))
  if (missing.length > 0) throw new Error(`PDF/A-1b is checked by PDFBox Preflight, and ${missing.map(([jar]) => jar).join(', ')} is missing: apt-get install default-jre-headless ${[...new Set(missing.map(([, name]) => name))].join(' ')}`)
  return new Promise((resolve, reject) => {
    execFile('java', ['-cp', Object.keys(PREFLIGHT_JARS).join(':'), 'org.apache.pdfbox.preflight.Validator_A1b', path], (error, stdout, stderr) => {
      if (!error && stdout.includes('is a valid PDF/A-1b file')) resolve('')
      else if (stdout.includes('not a valid PDF/A-1b file')) resolve(stdout.trim())
      else reject(new Error(`Preflight did not run (it needs Java, Debian's default-jre-headless): ${stderr || String(error)}`))
    })
  })
}
