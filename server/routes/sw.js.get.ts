import { notFound } from '~~/server/utils/errors'
import { workerText } from '~~/server/utils/worker'

/** The service worker under one address for good, so that it can always be switched off from here. */
export default defineEventHandler(async (event) => {
  const text = await workerText(process.env.HOLDOVER_WORKER === '0')
  if (text === null) return notFound('service worker')
  setResponseHeaders(event, { 'content-type': 'text/javascript; charset=utf-8', 'cache-control': 'no-cache', 'service-worker-allowed': '/' })
  return text
})
