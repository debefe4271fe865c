/** PostgreSQL's code for a value that must be unique and is not. */
const UNIQUE_VIOLATION = '23505'

/** Whether an error means that a unique value is in use. */
export function isTaken(error: unknown): boolean {
  for (let current = error; current instanceof Error; current = current.cause) {
    if ((current as { code?: unknown }).code === UNIQUE_VIOLATION) return true
  }
  return false
}
