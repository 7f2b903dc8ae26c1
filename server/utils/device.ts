/** What sort of machine a request comes from, for a person to tell their own sign-ins apart. */
export function deviceInWords(userAgent: string | undefined): string {
  if (!userAgent) return 'Unknown device'
  if (/\b(iPad|Tablet)\b/i.test(userAgent) || (/Android/.test(userAgent) && !/Mobile/.test(userAgent))) return 'Tablet'
  if (/Mobi|Android|iPhone/i.test(userAgent)) return 'Phone'
  return /^Mozilla\//.test(userAgent) ? 'Computer' : 'Script'
}
