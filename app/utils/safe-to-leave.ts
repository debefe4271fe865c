/** Whether a page belongs to the run of an outage, where something may be half entered and points may be in hand. */
export function isRunPath(path: string): boolean {
  return path.startsWith('/outages/')
}
