/** Why the last scan by a hand scanner opened nothing; null once that is dealt with. */
export function useScanNotice() {
  return useState<{ sentence: string, suggestion: string | null } | null>('scan-notice', () => null)
}
