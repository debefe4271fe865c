import type { Ref } from 'vue'
import { palette, type Ground } from '~~/shared/look/palette'

const year = 60 * 60 * 24 * 365

export interface Theme {
  /** The ground that the page stands on now. */
  ground: Readonly<Ref<Ground>>
  /** Turns the page dark or back to paper at once. */
  setDark: (dark: boolean) => void
  /** Follows a phase while the calling component lives, and gives the paper back when it goes. */
  darkWhile: (dark: () => boolean) => void
  /** High contrast on paper, for sunlight; remembered on this device. */
  contrast: Ref<boolean>
  /** The main act at 120 px; remembered on this device. */
  gloves: Ref<boolean>
}

/** The look of the page: dark follows the plant, contrast and gloves follow the person. */
export function useTheme(): Theme {
  const dark = useState('theme-dark', () => false)
  const contrast = useCookie<boolean>('holdover-contrast', { default: () => false, maxAge: year, sameSite: 'lax' })
  const gloves = useCookie<boolean>('holdover-gloves', { default: () => false, maxAge: year, sameSite: 'lax' })
  const ground = computed<Ground>(() => contrast.value ? 'contrast' : dark.value ? 'dark' : 'paper')

  function darkWhile(isDark: () => boolean) {
    watch(isDark, (value) => { dark.value = value }, { immediate: true })
    onScopeDispose(() => { dark.value = false })
  }

  return { ground, setDark: (value) => { dark.value = value }, darkWhile, contrast, gloves }
}

/** Writes the look to <html>; called once, by app.vue. */
export function useThemeHead(): void {
  const { ground, gloves } = useTheme()
  useHead({
    htmlAttrs: {
      'data-theme': () => ground.value,
      'data-gloves': () => gloves.value ? '' : undefined,
    },
    meta: [{ name: 'theme-color', content: () => palette[ground.value].paper }],
  })
}
