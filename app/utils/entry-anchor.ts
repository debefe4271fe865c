/** The place of an entry on the page of its record, as an address has it: "#entry-108". */
export const entryAnchor = (seq: number) => `#entry-${seq}`

/** The entry that an address names; null where it names none. */
export function entryOfAnchor(hash: string): number | null {
  const found = /^#entry-([1-9]\d{0,8})$/.exec(hash)
  return found ? Number(found[1]) : null
}
