/** The roles of people who sign in; each sees only the rooms that are theirs. */
export type NavigationRole = 'technician' | 'supervisor' | 'auditor' | 'administrator'

export interface NavigationItem {
  label: string
  to: string
}

/** The first page of each role: a supervisor's is the watch itself. */
const homes: Record<NavigationRole, NavigationItem[]> = {
  technician: [{ label: 'Outages', to: '/' }],
  supervisor: [{ label: 'Watch', to: '/watch' }],
  auditor: [{ label: 'Overview', to: '/' }, { label: 'Watch', to: '/watch' }],
  administrator: [{ label: 'Overview', to: '/' }, { label: 'Watch', to: '/watch' }],
}

/** The links of the header for a role, in their order; nothing for somebody without a known role. */
export function navigationFor(role: string | null | undefined): NavigationItem[] {
  if (!role || !Object.hasOwn(homes, role)) return []
  const items: NavigationItem[] = [
    ...homes[role as NavigationRole],
    { label: 'Records', to: '/records' },
    { label: 'Sites', to: '/sites' },
    { label: 'Rulebooks', to: '/rulebooks' },
  ]
  if (role !== 'technician') items.splice(items.findIndex(item => item.to === '/records') + 1, 0, { label: 'Insights', to: '/insights' })
  if (role === 'administrator') items.push({ label: 'People', to: '/people' }, { label: 'Mail', to: '/admin/mail' })
  items.push({ label: 'Account', to: '/account' })
  return items
}

/** Whether a path lies in the room of a link: '/' holds outages and plans too, mail also the mailbox, any other link what begins with it. */
export function isWithin(path: string, to: string): boolean {
  if (to === '/') return path === '/' || path.startsWith('/outages') || path.startsWith('/plans')
  if (to === '/admin/mail') return path.startsWith(to)
  return path === to || path.startsWith(`${to}/`)
}
