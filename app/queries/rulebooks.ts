import type { BookSite } from '~~/shared/schemas/site-view'

/** The sites that are judged by a rulebook, of those that the person may see. */
export function useBookSites(rulebook: string) {
  const request = useRequestFetch()
  const path: string = `/api/rulebooks/${rulebook}/sites`
  // A key a page: one shared by two pages would show on the second what the first was rendered with.
  return useAsyncData(`rulebook-sites-${rulebook}:${useRoute().path}`, () => request<BookSite[]>(path), { lazy: true })
}
