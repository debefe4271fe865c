import type { H3Event } from 'h3'
import { getQuery, getRequestHeader, getRouterParams, readRawBody } from 'h3'
import type { z } from 'zod'
import { firstFault, notFound, tooLarge, unprocessable, unreadable } from './errors'

/** Bytes of JSON that a request may hold unless its route says otherwise. */
const BODY_MAX = 1_000_000

/** The body as the schema gives it. Unreadable: 400; too large: 413; a wrong field: 422 with its name. */
export async function readBodyAs<T extends z.ZodTypeAny>(event: H3Event, schema: T, maxBytes = BODY_MAX): Promise<z.output<T>> {
  return check(await readJson(event, maxBytes), schema)
}

/** The body as JSON. */
export async function readJson(event: H3Event, maxBytes = BODY_MAX): Promise<unknown> {
  const declared = Number(getRequestHeader(event, 'content-length') ?? 0)
  if (declared > maxBytes) return tooLarge(`At most ${maxBytes} bytes`)
  const text = await readRawBody(event, 'utf8')
  if (!text) return unreadable('The body is empty; send JSON')
  if (Buffer.byteLength(text) > maxBytes) return tooLarge(`At most ${maxBytes} bytes`)
  try {
    return JSON.parse(text)
  } catch {
    return unreadable('The body is not JSON')
  }
}

export function readQueryAs<T extends z.ZodTypeAny>(event: H3Event, schema: T): z.output<T> {
  return check(getQuery(event), schema)
}

/** Route parameters; a malformed id is a thing that does not exist. */
export function readParamsAs<T extends z.ZodTypeAny>(event: H3Event, schema: T, what: string): z.output<T> {
  const parsed = schema.safeParse(getRouterParams(event))
  return parsed.success ? parsed.data : notFound(what)
}

function check<T extends z.ZodTypeAny>(value: unknown, schema: T): z.output<T> {
  const parsed = schema.safeParse(value)
  if (parsed.success) return parsed.data
  const { field, reason } = firstFault(parsed.error)
  return unprocessable(field, reason)
}
