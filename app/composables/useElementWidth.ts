import { onBeforeUnmount, onMounted, readonly, ref, type Ref } from 'vue'

/**
 * The width of an element in px, so that a drawing is laid out for it instead of shrunk with its words.
 * Until the page is mounted it is `fallback`; the drawing then scales to its container.
 */
export function useElementWidth(element: Readonly<Ref<HTMLElement | null>>, fallback: number): Readonly<Ref<number>> {
  const width = ref(fallback)
  let observer: ResizeObserver | undefined

  onMounted(() => {
    observer = new ResizeObserver(([entry]) => {
      if (entry && entry.contentRect.width > 0) width.value = Math.round(entry.contentRect.width)
    })
    if (element.value) observer.observe(element.value)
  })
  onBeforeUnmount(() => observer?.disconnect())
  return readonly(width)
}
