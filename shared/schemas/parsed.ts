import type { z } from 'zod'

/** What a parser of a request's body hands back: the input, or the field at fault and why, in words. */
export type Parsed<T>
  = | { ok: true, input: T }
    | { ok: false, field: string, reason: string }

const TYPE_WORDS: Readonly<Record<string, string>> = {
  array: 'a list',
  boolean: 'true or false',
  number: 'a number',
  object: 'an object',
  string: 'text',
}

/**
 * Parses a body by a schema and words the first fault so that it can stand
 * alone on a screen. `field` is the path as people write it ("compressors[2].kw"), or
 * "body" when the body as a whole is wrong.
 */
export function parseWith<S extends z.ZodTypeAny>(schema: S, body: unknown): Parsed<z.output<S>> {
  const result = schema.safeParse(body)
  if (result.success) {
    return { ok: true, input: result.data as z.output<S> }
  }
  const issue = result.error.issues[0]!
  const field = pathWords(issue.path) || 'body'
  return { ok: false, field, reason: `${field} ${faultWords(issue)}` }
}

function pathWords(path: readonly (string | number)[]): string {
  return path.reduce<string>((words, part) =>
    typeof part === 'number' ? `${words}[${part}]` : words === '' ? part : `${words}.${part}`, '')
}

/** The fault as the end of a sentence that begins with the field's name. */
function faultWords(issue: z.ZodIssue): string {
  switch (issue.code) {
    case 'invalid_type':
      return issue.received === 'undefined'
        ? 'is needed'
        : `must be ${TYPE_WORDS[issue.expected] ?? issue.expected}`
    case 'invalid_enum_value':
      return `must be one of ${issue.options.join(', ')}`
    case 'invalid_union_discriminator':
      return `must be one of ${issue.options.join(', ')}`
    default:
      return issue.message
  }
}
