import { join } from 'node:path'
import { pathToFileURL } from 'node:url'
import { build } from 'vite'

/** Not written out, so that this file can be bundled too. */
const ADDRESS = ['import', 'meta', 'url'].join('.')

/** A bundle lies elsewhere than its sources: what these find beside themselves they go on finding. */
const ownAddress = {
  name: 'own-address',
  transform: (code, id) => code.includes(ADDRESS) ? code.replaceAll(ADDRESS, JSON.stringify(pathToFileURL(id).href)) : null,
}

/**
 * Bundles a program, so that it runs as the built server does: without a transpiler's detours between modules.
 * @param {string} root of the repository
 * @param {string} file path of the source below it
 * @param {string} room a directory below node_modules, so that what is not bundled is found from there
 * @returns {Promise<string>} path of the bundle
 */
export async function bundle(root, file, room) {
  const name = `${file.replaceAll('/', '-')}.mjs`
  await build({
    configFile: false,
    root,
    logLevel: 'error',
    resolve: { alias: { '~~': root, '@@': root, '#shared': join(root, 'shared') } },
    plugins: [ownAddress],
    build: { ssr: join(root, file), outDir: room, emptyOutDir: false, rollupOptions: { output: { entryFileNames: name } } },
  })
  return join(room, name)
}
