/** A small browser for tests: keeps cookies, follows nothing by itself. */
export interface Client {
  url: string
  cookies: Map<string, string>
  /** As the global one, with the path below the server's address. */
  fetch: (path: string, init?: RequestInit) => Promise<Response>
  /** Sends JSON, if there is a body, and reads JSON; what is no JSON is given as text. */
  send: <T = unknown>(method: string, path: string, body?: unknown) => Promise<{ status: number, body: T }>
}

export const DEMO_PASSWORD = 'holdover-demo'

/** A client that is not signed in. */
export function visitor(url: string): Client {
  const cookies = new Map<string, string>()

  async function fetchPath(path: string, init: RequestInit = {}) {
    const headers = new Headers(init.headers)
    if (cookies.size > 0) headers.set('cookie', [...cookies].map(([name, value]) => `${name}=${value}`).join('; '))
    // A browser tells where a page that changes something came from.
    if (init.method && init.method !== 'GET' && !headers.has('origin')) headers.set('origin', url)
    const response = await fetch(new URL(path, url), { redirect: 'manual', ...init, headers })
    for (const line of response.headers.getSetCookie()) keepCookie(cookies, line)
    return response
  }

  return {
    url,
    cookies,
    fetch: fetchPath,
    async send<T>(method: string, path: string, body?: unknown) {
      const response = await fetchPath(path, body === undefined
        ? { method }
        : { method, body: JSON.stringify(body), headers: { 'content-type': 'application/json' } })
      const text = await response.text()
      return { status: response.status, body: readJson(text) as T }
    },
  }
}

/**
 * Signs in as a person does, through the session routes.
 * @throws Error with the server's answer when it does not let them in
 */
export async function signIn(url: string, email: string, password = DEMO_PASSWORD): Promise<Client> {
  const client = visitor(url)
  const { body: { csrfToken } } = await client.send<{ csrfToken: string }>('GET', '/api/auth/csrf')
  const response = await client.fetch('/api/auth/callback/credentials', {
    method: 'POST',
    headers: { 'content-type': 'application/x-www-form-urlencoded' },
    body: new URLSearchParams({ email, password, csrfToken, json: 'true', callbackUrl: url }),
  })
  const answer = await response.text()
  if (![...client.cookies.keys()].some(name => name.endsWith('session-token'))) {
    throw new Error(`${email} was not let in: ${response.status} ${answer.slice(0, 300)}`)
  }
  return client
}

/** Takes over one Set-Cookie line; an empty or expired one takes the cookie away. */
function keepCookie(cookies: Map<string, string>, line: string) {
  const [pair = '', ...attributes] = line.split(';')
  const name = pair.slice(0, pair.indexOf('=')).trim()
  const value = pair.slice(pair.indexOf('=') + 1).trim()
  const gone = value === '' || attributes.some(attribute => /^\s*max-age=0*$/i.test(attribute))
  if (gone) cookies.delete(name)
  else cookies.set(name, value)
}

function readJson(text: string): unknown {
  try {
    return JSON.parse(text)
  } catch {
    return text
  }
}
