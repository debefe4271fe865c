/**
 * The colours of Holdover, by role and never by hue. One list feeds the style sheet, the PDF and the contrast tests.
 *
 * Red (`limit`) means a limit and nothing else; amber (`hand`, `handText`, `handFill`) means in hand and nothing else.
 */
export const grounds = ['paper', 'dark', 'contrast'] as const
export type Ground = (typeof grounds)[number]

export const colourRoles = [
  'paper', 'sheet', 'ink', 'ink-2', 'rule', 'field', 'grid', 'trace', 'limit', 'hand', 'hand-text', 'hand-fill', 'fine',
] as const
export type ColourRole = (typeof colourRoles)[number]

/** Hex colours (#RRGGBB) of each role on each ground: paper with control, dark without it, contrast in sunlight. */
export const palette: Record<Ground, Record<ColourRole, string>> = {
  paper: {
    'paper': '#F4EFE3',
    'sheet': '#FDFBF5',
    'ink': '#18211C',
    'ink-2': '#49524C',
    'rule': '#D8D0BC',
    'field': '#998759',
    'grid': '#D3DECC',
    'trace': '#1A4E95',
    'limit': '#99201A',
    'hand': '#B36A00',
    'hand-text': '#744500',
    'hand-fill': '#F3B33D',
    'fine': '#235A34',
  },
  dark: {
    'paper': '#0F1714',
    'sheet': '#18221D',
    'ink': '#F3EFE2',
    'ink-2': '#B4BFB6',
    'rule': '#2E3A34',
    'field': '#597064',
    'grid': '#24322C',
    'trace': '#8CBCFF',
    'limit': '#FF897B',
    'hand': '#F3B33D',
    'hand-text': '#F6C467',
    'hand-fill': '#F3B33D',
    'fine': '#86CF98',
  },
  contrast: {
    'paper': '#FFFFFF',
    'sheet': '#FFFFFF',
    'ink': '#000000',
    'ink-2': '#1F2622',
    'rule': '#8A8A8A',
    'field': '#3A3A3A',
    'grid': '#B5B5B5',
    'trace': '#0A2F6B',
    'limit': '#7A0D08',
    'hand': '#7A4700',
    'hand-text': '#4A2B00',
    'hand-fill': '#F3B33D',
    'fine': '#0F4020',
  },
}

/**
 * Signal panels of hazard notices, the same on every ground: signal word's colours by ANSI Z535.1 and Z535.4
 * (black on safety orange for WARNING; the four hex values are from memory).
 */
export const hazards = {
  danger: { panel: '#C8102E', word: '#FFFFFF' },
  warning: { panel: '#FF7900', word: '#000000' },
  caution: { panel: '#FFD100', word: '#000000' },
  notice: { panel: '#005EB8', word: '#FFFFFF' },
} as const
export type Hazard = keyof typeof hazards

/** '#1A4E95' → '26 78 149', the channels that a style sheet can mix with an alpha. */
export function channels(hex: string): string {
  return [1, 3, 5].map(start => Number.parseInt(hex.slice(start, start + 2), 16)).join(' ')
}
