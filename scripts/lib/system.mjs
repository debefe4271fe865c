import { existsSync } from 'node:fs'
import { delimiter, join } from 'node:path'
import { run } from './processes.mjs'
import { Refusal, say, spell } from './say.mjs'

/** Jars of PDFBox Preflight and what it needs on a Java later than 10, each with the Debian package that brings it. */
export const PREFLIGHT_JARS = {
  '/usr/share/java/preflight.jar': 'libpdfbox2-java',
  '/usr/share/java/pdfbox2.jar': 'libpdfbox2-java',
  '/usr/share/java/xmpbox.jar': 'libpdfbox2-java',
  '/usr/share/java/fontbox2.jar': 'libfontbox2-java',
  '/usr/share/java/commons-logging.jar': 'libcommons-logging-java',
  '/usr/share/java/javax.activation.jar': 'libactivation-java',
  '/usr/share/java/jaxb-api.jar': 'libjaxb-api-java',
}

/**
 * Looks a program up as a shell would.
 * @param {string} name
 * @param {string} [path] directories, as in PATH
 * @returns {string | null} its full path
 */
export function findProgram(name, path = process.env.PATH ?? '') {
  for (const directory of path.split(delimiter)) {
    if (directory && existsSync(join(directory, name))) return join(directory, name)
  }
  return null
}

/**
 * Installs packages of the system where that is possible: as root, with apt-get.
 * @param {string[]} packages names in Debian
 * @param {string} purpose begins the sentence that a person reads when it is not possible
 * @param {{ uid?: number, path?: string }} [machine] given by tests
 */
export async function installSystemPackages(packages, purpose, machine = {}) {
  const { uid = process.getuid?.(), path = process.env.PATH } = machine
  const names = packages.join(' ')
  const aptGet = findProgram('apt-get', path)
  if (uid !== 0 || !aptGet) {
    throw new Refusal(`${purpose}. ${aptGet ? `Install with: sudo apt-get install ${names}` : `Install ${names} by the means of this system`}.`)
  }
  say(`Installing ${names} by apt-get`)
  const began = Date.now()
  const env = { ...process.env, PATH: path, DEBIAN_FRONTEND: 'noninteractive' }
  // A list that cannot be renewed may still be good enough to install from.
  const renewed = await run(aptGet, ['update', '-qq'], { quiet: true, env })
  const { code, output } = await run(aptGet, ['install', '-y', '-qq', '--no-install-recommends', ...packages], { quiet: true, env })
  if (code !== 0) {
    throw new Refusal(`apt-get could not install ${names}:\n${`${renewed.output}\n${output}`.trim().split('\n').slice(-15).join('\n')}`)
  }
  say(`Installed in ${spell(Date.now() - began)}`)
}
