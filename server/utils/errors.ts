import { createError } from 'h3'
import type { H3Error } from 'h3'
import type { ZodError } from 'zod'

/** What every error answer carries in `data`: the field in question, if any, and the reason in words. */
export interface ErrorData { field?: string, reason: string, [more: string]: unknown }

function failure(statusCode: number, statusMessage: string, data: ErrorData): H3Error<ErrorData> {
  return createError({ statusCode, statusMessage, message: data.reason, data })
}

/** 400: the request cannot be read at all. */
export const unreadable = (reason: string): never => { throw failure(400, 'Bad Request', { reason }) }
/** 401: nobody is signed in. */
export const unauthenticated = (): never => { throw failure(401, 'Unauthorized', { reason: 'Sign in first' }) }
/** 403: known, visible, but not for this person; the reason says why. */
export const forbidden = (reason: string): never => { throw failure(403, 'Forbidden', { reason }) }
/** 404: not there, or not theirs: the same answer. */
export const notFound = (what: string): never => { throw failure(404, 'Not Found', { reason: `There is no such ${what}` }) }
/** 409: clashes with what is stored. */
export const conflict = (reason: string, field?: string): never => { throw failure(409, 'Conflict', { reason, ...(field ? { field } : {}) }) }
/** 410: it was there, and is over or taken away for good. */
export const gone = (reason: string): never => { throw failure(410, 'Gone', { reason }) }
/** 413: more bytes than are taken. */
export const tooLarge = (reason: string): never => { throw failure(413, 'Content Too Large', { reason }) }
/** 422: readable, but a field is wrong. */
export const unprocessable = (field: string, reason: string): never => { throw failure(422, 'Unprocessable Content', { field, reason }) }
/** 429: too many tries. @param seconds until the next one */
export const tooMany = (reason: string, seconds: number): never => { throw failure(429, 'Too Many Requests', { reason, seconds }) }
/** 503: the database is away. */
export const unavailable = (): never => { throw failure(503, 'Service Unavailable', { reason: 'The database is away; nothing was lost, try again in a moment' }) }

/** A zod path as people write it: readings[1].at */
export function fieldName(path: readonly (string | number)[]): string {
  return path.reduce<string>((text, part) => typeof part === 'number' ? `${text}[${part}]` : text ? `${text}.${part}` : part, '')
}

/** First fault of a failed parse. */
export function firstFault(error: ZodError): { field: string, reason: string } {
  const issue = error.issues[0]!
  return { field: fieldName(issue.path), reason: issue.message }
}
