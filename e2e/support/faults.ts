import type { BrowserContext } from '@playwright/test'

/** What no page may do unnoticed: the test that caused it fails. */
export interface Faults {
  /** Watches all pages of a context, present and to come. */
  watch: (context: BrowserContext) => void
  /**
   * Lets pass what a test brings about on purpose, such as the console line of a refused request.
   * @param pattern of the fault's text
   */
  allow: (pattern: RegExp) => void
  /** What was noticed and not allowed. */
  list: () => string[]
}

/** Collects console errors, uncaught errors, hydration mismatches, breaches of the content policy and requests off the machine. */
export function collectFaults(): Faults {
  const found: string[] = []
  const allowed: RegExp[] = []
  return {
    watch(context) {
      context.on('console', (message) => {
        const text = message.text()
        // A breach of the content policy is told as an error; a hydration mismatch may be told as a warning.
        if (message.type() === 'error' || /hydrat/i.test(text)) found.push(`console ${message.type()}: ${text} (${message.location().url})`)
      })
      context.on('weberror', error => found.push(`uncaught: ${error.error().stack ?? error.error().message}`))
      context.on('request', (request) => {
        const { protocol, hostname } = new URL(request.url())
        if (/^(https?|wss?):$/.test(protocol) && hostname !== '127.0.0.1') found.push(`request off the machine: ${request.method()} ${request.url()}`)
      })
    },
    allow: pattern => allowed.push(pattern),
    list: () => found.filter(fault => !allowed.some(pattern => pattern.test(fault))),
  }
}
