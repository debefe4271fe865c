import type { Config } from 'tailwindcss'
import plugin from 'tailwindcss/plugin'
import { channels, colourRoles, grounds, hazards, palette, type Ground } from './shared/look/palette'

const role = (name: string) => `rgb(var(--${name}) / <alpha-value>)`

function variables(ground: Ground): Record<string, string> {
  return Object.fromEntries(colourRoles.map(name => [`--${name}`, channels(palette[ground][name])]))
}

export default {
  // The Nuxt module adds components, layouts, pages and composables; class names also stand in plain lists here.
  content: ['./app/**/*.{vue,ts}'],
  theme: {
    colors: {
      inherit: 'inherit',
      current: 'currentColor',
      transparent: 'transparent',
      ...Object.fromEntries(colourRoles.map(name => [name, role(name)])),
      hazard: {
        danger: hazards.danger.panel,
        warning: hazards.warning.panel,
        caution: hazards.caution.panel,
        notice: hazards.notice.panel,
        ink: '#000000',
        white: '#FFFFFF',
      },
    },
    fontFamily: {
      sans: ['"IBM Plex Sans"', 'system-ui', 'sans-serif'],
      mono: ['"IBM Plex Mono"', 'ui-monospace', 'monospace'],
    },
    // Nothing is set smaller than 16 px; `reading` is for measured values.
    fontSize: {
      'base': ['1rem', '1.5rem'],
      'lg': ['1.125rem', '1.625rem'],
      'xl': ['1.25rem', '1.75rem'],
      '2xl': ['1.5rem', '2rem'],
      'reading': ['1.75rem', '2rem'],
      '3xl': ['2rem', '2.375rem'],
      '4xl': ['2.5rem', '2.875rem'],
      '5xl': ['3.25rem', '3.5rem'],
    },
    // One radius and no shadow: rules separate, boxes do not.
    borderRadius: { none: '0', DEFAULT: '6px' },
    boxShadow: { none: 'none' },
    extend: {
      spacing: { touch: '3.75rem', act: '4.5rem', glove: '7.5rem' },
      width: { phone: '30rem' },
      maxWidth: { phone: '30rem', page: '80rem', prose: '42rem' },
      borderWidth: { 3: '3px' },
    },
  },
  plugins: [
    plugin(({ addBase }) => {
      for (const ground of grounds) {
        const selector = ground === 'paper' ? ':root, [data-theme="paper"]' : `[data-theme="${ground}"]`
        addBase({ [selector]: { ...variables(ground), colorScheme: ground === 'dark' ? 'dark' : 'light' } })
      }
      // Paper is what a printer has, whatever the screen shows.
      addBase({ '@media print': { ':root, [data-theme]': { ...variables('paper'), '--paper': '255 255 255', '--sheet': '255 255 255' } } })
    }),
  ],
} satisfies Config
