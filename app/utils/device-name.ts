const BROWSERS: [RegExp, string][] = [
  [/Edg(A|iOS)?\//, 'Edge'],
  [/(Firefox|FxiOS)\//, 'Firefox'],
  [/CriOS\//, 'Chrome'],
  [/Chrome\//, 'Chromium'],
  [/Safari\//, 'Safari'],
]

const SYSTEMS: [RegExp, string][] = [
  [/Android/, 'Android'],
  [/iPhone/, 'iPhone'],
  [/iPad/, 'iPad'],
  [/Windows/, 'Windows'],
  [/CrOS/, 'ChromeOS'],
  [/Mac OS X/, 'Mac'],
  [/Linux/, 'Linux'],
]

/** A first name for a device, as "Chromium on Linux", from what its browser calls itself; people change it. */
export function deviceName(userAgent: string): string {
  const find = (list: [RegExp, string][]) => list.find(([pattern]) => pattern.test(userAgent))?.[1]
  return `${find(BROWSERS) ?? 'Browser'} on ${find(SYSTEMS) ?? 'this device'}`
}
