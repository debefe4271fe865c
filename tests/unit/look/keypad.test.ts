import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import {
  emptyEntry, entryFromText, entryOf, entryText, entryValue, pressDigit, pressErase, pressSign, type KeypadEntry,
} from '../../../shared/look/keypad'

const typed = (keys: string, start: KeypadEntry = emptyEntry) => [...keys].reduce((entry, key) => pressDigit(entry, key), start)

// The fixed decimal is the product's own rule: 384 reads 38.4.
describe('the keypad', () => {
  it('reads 384 as 38.4 with one decimal, and as 384 with none', () => {
    expect(entryValue(typed('384'), 1)).toBe(38.4)
    expect(entryText(typed('384'), 1)).toBe('38.4')
    expect(entryText(typed('384'), 0)).toBe('384')
  })

  it('shows each step on the way', () => {
    expect(['', '3', '38', '384'].map(keys => entryText(typed(keys), 1))).toEqual(['', '0.3', '3.8', '38.4'])
  })

  it('is null before the first digit, with or without a sign', () => {
    expect(entryValue(emptyEntry, 1)).toBeNull()
    expect(entryValue(pressSign(emptyEntry), 1)).toBeNull()
    expect(entryText(pressSign(emptyEntry), 1)).toBe('−')
  })

  it('takes the sign before or after the digits', () => {
    expect(entryValue(typed('5', pressSign(emptyEntry)), 1)).toBe(-0.5)
    expect(entryValue(pressSign(typed('5')), 1)).toBe(-0.5)
    expect(Object.is(entryValue(pressSign(typed('0')), 1), 0)).toBe(true)
  })

  it('erases digits, then the sign', () => {
    const minusFive = typed('5', pressSign(emptyEntry))
    expect(entryText(pressErase(minusFive), 1)).toBe('−')
    expect(pressErase(pressErase(minusFive))).toEqual(emptyEntry)
  })

  it('ignores what is no digit and digits past the longest', () => {
    expect(pressDigit(typed('38'), 'x')).toEqual(typed('38'))
    expect(typed('123456').digits).toBe('12345')
    expect(typed('0038').digits).toBe('38')
  })

  it('takes pasted text with a point or comma as it stands, digits alone as keys', () => {
    expect(entryValue(entryFromText('38.4', 1), 1)).toBe(38.4)
    expect(entryValue(entryFromText(' −0,5', 1), 1)).toBe(-0.5)
    expect(entryValue(entryFromText('384', 1), 1)).toBe(38.4)
    expect(entryFromText('warm', 1)).toEqual(emptyEntry)
  })

  it('shows any value it gave back as the same value', () => {
    fc.assert(fc.property(fc.integer({ min: -99_999, max: 99_999 }), fc.integer({ min: 0, max: 2 }), (whole, decimals) => {
      const value = whole / 10 ** decimals
      expect(entryValue(entryOf(value, decimals), decimals)).toBe(value === 0 ? 0 : value)
    }))
  })
})
