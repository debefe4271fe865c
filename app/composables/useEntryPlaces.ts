import type { InjectionKey, Ref } from 'vue'
import { inject, onMounted, provide, readonly, shallowRef, watch } from 'vue'
import { useRoute } from '#imports'
import { entryOfAnchor } from '~/utils/entry-anchor'

/** Which entry of a record is asked for. A new object each time: asking twice for the same one shows it twice. */
export interface EntryPlaces {
  wanted: Readonly<Ref<{ readonly seq: number } | null>>
  show: (seq: number) => void
  /** For the entry itself: whether it is asked for and has not shown itself yet. True once for each asking. */
  take: (seq: number) => boolean
}

const KEY: InjectionKey<EntryPlaces> = Symbol('entry places')

/** For the page that shows a record: entries that its links, or the address, ask for. */
export function provideEntryPlaces(): EntryPlaces {
  const wanted = shallowRef<{ seq: number } | null>(null)
  const show = (seq: number) => { wanted.value = { seq } }
  let taken: { seq: number } | null = null
  const take = (seq: number) => {
    if (wanted.value?.seq !== seq || taken === wanted.value) return false
    taken = wanted.value
    return true
  }
  const route = useRoute()
  const follow = (hash: string) => {
    const seq = entryOfAnchor(hash)
    if (seq !== null) show(seq)
  }
  onMounted(() => follow(route.hash))
  watch(() => route.hash, follow)
  const places = { wanted: readonly(wanted), show, take }
  provide(KEY, places)
  return places
}

export function useEntryPlaces(): EntryPlaces {
  const places = inject(KEY)
  if (!places) throw new Error('useEntryPlaces outside a record')
  return places
}
