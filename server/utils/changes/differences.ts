import type { FieldChange } from '../../../shared/schemas/changes'

type Fields = Record<string, unknown>

/** The fields in which two values differ, by name; a missing field counts as null. Values are plain JSON. */
export function differences(before: Fields, after: Fields): FieldChange[] {
  const names = [...new Set([...Object.keys(before), ...Object.keys(after)])].sort()
  return names
    .map(field => ({ field, before: before[field] ?? null, after: after[field] ?? null }))
    .filter(change => stable(change.before) !== stable(change.after))
}

/** JSON whose objects have their fields in one order, so that a row read back equals the value that was sent. */
function stable(value: unknown): string {
  return JSON.stringify(value, (_key, item: unknown) => typeof item === 'object' && item !== null && !Array.isArray(item)
    ? Object.fromEntries(Object.entries(item).sort(([a], [b]) => a < b ? -1 : 1))
    : item)
}
