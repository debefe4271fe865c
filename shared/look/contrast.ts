/** Relative luminance, 0 to 1, of a hex colour (#RRGGBB). Formula: WCAG 2.2, definition of relative luminance. */
export function luminance(hex: string): number {
  const [red, green, blue] = [1, 3, 5].map((start) => {
    const share = Number.parseInt(hex.slice(start, start + 2), 16) / 255
    return share <= 0.04045 ? share / 12.92 : ((share + 0.055) / 1.055) ** 2.4
  })
  return 0.2126 * red! + 0.7152 * green! + 0.0722 * blue!
}

/** Contrast ratio, 1 to 21, of two hex colours in either order. Formula: WCAG 2.2, definition of contrast ratio. */
export function contrastRatio(one: string, other: string): number {
  const [low, high] = [luminance(one), luminance(other)].sort((a, b) => a - b)
  return (high! + 0.05) / (low! + 0.05)
}
