import { describe, expect, it } from 'vitest'
import { contrastRatio } from '../../../shared/look/contrast'
import { channels, grounds, hazards, palette, type ColourRole } from '../../../shared/look/palette'

const textRoles: ColourRole[] = ['ink', 'ink-2', 'trace', 'limit', 'hand-text', 'fine']
const markRoles: ColourRole[] = ['field', 'trace', 'limit', 'hand', 'fine', 'ink', 'ink-2']

describe('contrastRatio', () => {
  // WCAG 2.2, definition of contrast ratio: 21 for black on white, 1 for a colour on itself.
  it('runs from 1 to 21 and does not mind the order', () => {
    expect(contrastRatio('#000000', '#FFFFFF')).toBeCloseTo(21, 5)
    expect(contrastRatio('#FFFFFF', '#000000')).toBeCloseTo(21, 5)
    expect(contrastRatio('#B36A00', '#B36A00')).toBe(1)
  })

  // WCAG's Understanding 1.4.3 (from memory): #767676 is the lightest grey that reaches 4.5 on white.
  it('puts #767676 on white just above 4.5 and #777777 just below', () => {
    expect(contrastRatio('#767676', '#FFFFFF')).toBeGreaterThan(4.5)
    expect(contrastRatio('#777777', '#FFFFFF')).toBeLessThan(4.5)
  })
})

describe.each(grounds)('the palette on %s', (ground) => {
  const colours = palette[ground]

  // WCAG 2.2, 1.4.6 contrast (enhanced): 7:1 for text.
  it.each(textRoles)('%s reads as text at 7:1 or more on paper', (role) => {
    expect(contrastRatio(colours[role], colours.paper)).toBeGreaterThanOrEqual(7)
  })
  it.each(textRoles)('%s reads as text at 7:1 or more on a sheet', (role) => {
    expect(contrastRatio(colours[role], colours.sheet)).toBeGreaterThanOrEqual(7)
  })

  // WCAG 2.2, 1.4.11 non-text contrast: 3:1 for what a control or a chart is recognised by.
  it.each(markRoles)('%s is seen as a mark at 3:1 or more on paper and sheet', (role) => {
    expect(contrastRatio(colours[role], colours.paper)).toBeGreaterThanOrEqual(3)
    expect(contrastRatio(colours[role], colours.sheet)).toBeGreaterThanOrEqual(3)
  })

  // Readings are in ink at 10:1 or more: the product's own rule, stricter than WCAG.
  it('sets readings at 10:1 or more', () => {
    expect(contrastRatio(colours.ink, colours.paper)).toBeGreaterThanOrEqual(10)
    expect(contrastRatio(colours.ink, colours.sheet)).toBeGreaterThanOrEqual(10)
  })
})

describe('hazard panels', () => {
  // WCAG 2.2, 1.4.6: 4.5:1 for large text, which the signal words of white-on-colour panels are; 7:1 where sentences stand.
  it.each(Object.entries(hazards))('%s shows its signal word', (name, { panel, word }) => {
    const sentencesStandOnIt = name === 'warning' || name === 'caution'
    expect(contrastRatio(panel, word)).toBeGreaterThanOrEqual(sentencesStandOnIt ? 7 : 4.5)
  })
})

describe('channels', () => {
  it('splits a hex colour in three decimal numbers', () => {
    expect(channels('#1A4E95')).toBe('26 78 149')
  })
})
