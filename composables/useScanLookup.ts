import { formatTag, readScannedText, scanProblemSentence } from '#shared/domain/tag'
import type { TaggedThing } from '#shared/types/tagged-thing'

export type ScanAnswer
  = | { ok: true, thing: TaggedThing }
    /** `suggestion` is the compact tag probably meant, where there is exactly one. */
    | { ok: false, sentence: string, suggestion: string | null }

/** Finds what a scanned or typed text stands for: the check character is judged here, the rest by the server. */
export function useScanLookup() {
  const { public: { baseUrl } } = useRuntimeConfig()
  const configured = typeof baseUrl === 'string' && URL.canParse(baseUrl) ? new URL(baseUrl).host : null

  async function look(text: string): Promise<ScanAnswer> {
    const hosts = [globalThis.location.host, ...configured ? [configured] : []]
    const read = readScannedText(text, hosts)
    if (!read.ok) {
      const suggestion = read.reason === 'ambiguous' ? read.suggestion : null
      return { ok: false, sentence: scanProblemSentence(read), suggestion }
    }
    try {
      return { ok: true, thing: await $fetch<TaggedThing>(`/api/tags/${read.tag}`) }
    } catch (error) {
      const sentence = problemOf(error)?.detail ?? `${formatTag(read.tag)} was read, but the shop’s server could not be reached. Try again.`
      return { ok: false, sentence, suggestion: null }
    }
  }
  return { look }
}
