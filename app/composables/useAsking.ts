import type { InjectionKey, Ref } from 'vue'
import { inject, provide } from 'vue'

/** How whoever reads a record asks about an entry of it. */
export interface Asking {
  /** Signs the question; `about` is an entry's id, null the record as a whole. Gives whether it is kept. */
  ask: (about: string | null, words: string) => Promise<boolean>
  busy: Readonly<Ref<boolean>>
}

const KEY: InjectionKey<Asking> = Symbol('asking')

export function provideAsking(asking: Asking): void {
  provide(KEY, asking)
}

/** Null where nothing can be asked: the reader signs nothing here. */
export function useAsking(): Asking | null {
  return inject(KEY, null)
}
