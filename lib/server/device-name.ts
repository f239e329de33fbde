import 'server-only'

/** Programs before those whose name they carry as well: every browser claims to be several others. */
const BROWSERS: [RegExp, string][] = [
  [/\bEdg(e|A|iOS)?\//, 'Edge'],
  [/\bOPR\/|\bOpera\b/, 'Opera'],
  [/\bVivaldi\//, 'Vivaldi'],
  [/\bSamsungBrowser\//, 'Samsung Internet'],
  [/\b(Firefox|FxiOS)\//, 'Firefox'],
  [/\b(HeadlessChrome|Chrome|Chromium|CriOS)\//, 'Chrome or Chromium'],
  [/\bSafari\//, 'Safari'],
]

const SYSTEMS: [RegExp, string][] = [
  [/\bAndroid\b/, 'Android'],
  [/\biPhone\b/, 'an iPhone'],
  [/\biPad\b/, 'an iPad'],
  [/\bWindows\b/, 'Windows'],
  [/\bCrOS\b/, 'ChromeOS'],
  [/\bMac OS X\b|\bMacintosh\b/, 'a Mac'],
  [/\bLinux\b|\bX11\b/, 'Linux'],
]

function firstMatch(rules: [RegExp, string][], text: string): string | undefined {
  return rules.find(([pattern]) => pattern.test(text))?.[1]
}

/** What a browser calls itself, in words that tell one device from another: “Firefox on Linux”. */
export function deviceName(userAgent: string | null): string {
  const browser = firstMatch(BROWSERS, userAgent ?? '')
  const system = firstMatch(SYSTEMS, userAgent ?? '')
  if (browser) return system ? `${browser} on ${system}` : browser
  return system ? `A browser on ${system}` : 'An unknown device'
}
