import type { ZodErrorMap } from 'zod'

/** Words for what a schema refuses without words of its own. */
export const formErrorMap: ZodErrorMap = (issue, context) => {
  switch (issue.code) {
    case 'invalid_type':
      return { message: issue.expected === 'number' || issue.expected === 'integer' ? 'Enter a number' : issue.received === 'null' || issue.received === 'undefined' ? 'Choose one' : 'This cannot be read' }
    case 'invalid_enum_value':
      return { message: 'Choose one' }
    case 'too_small':
      return { message: issue.type === 'number' ? `At least ${issue.minimum}` : issue.type === 'array' ? 'Choose at least one' : 'Enter something' }
    case 'too_big':
      return { message: issue.type === 'number' ? `At most ${issue.maximum}` : issue.type === 'array' ? `At most ${issue.maximum}` : `At most ${issue.maximum} characters` }
    default:
      return { message: context.defaultError }
  }
}
