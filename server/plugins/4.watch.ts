import { closeWatch } from '~~/server/utils/watch/listen'

/** Open streams end as soon as the server is told to, so that it need not wait for them. */
export default defineNitroPlugin((nitro) => {
  if (import.meta.prerender) return
  for (const signal of ['SIGTERM', 'SIGINT'] as const) process.once(signal, () => { void closeWatch() })
  nitro.hooks.hook('close', closeWatch)
})
