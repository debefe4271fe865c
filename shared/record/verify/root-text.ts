/**
 * Reads a root as somebody copied it from an e-mail or off paper: spaces, line ends, colons and capitals do not matter.
 * @returns the 64 digits, null for an empty text, or what is wrong with it in words
 */
export function readRoot(text: string): { root: string | null, fault: string } {
  const digits = text.replace(/[\s:\u00A0\u200B-]+/g, '').replace(/^0x/i, '').toLowerCase()
  if (digits === '') return { root: null, fault: '' }
  const wrong = [...digits].find(digit => !/[0-9a-f]/.test(digit))
  if (wrong === '…' || wrong === '.') return { root: null, fault: 'This root is shortened. The whole of it, 64 digits, stands in the closing e-mail and at the end of the PDF.' }
  if (wrong !== undefined) return { root: null, fault: `“${wrong}” cannot stand in a root: it is made of the digits 0 to 9 and the letters a to f.` }
  if (digits.length !== 64) return { root: null, fault: `A root has 64 digits; this one has ${digits.length}.` }
  return { root: digits, fault: '' }
}
