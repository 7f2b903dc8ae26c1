import Fuse from 'fuse.js'
import { parseFrequencyQuery } from '#shared/domain/frequency-query'
import type { SearchRecord } from '#shared/domain/stock-search'
import { asksOfCoverage, countInWords, rankByWords, searchRecord, searchStock, searchWords, STOCK_INDEX_OPTIONS } from '#shared/domain/stock-search'
import type { UnitState } from '#shared/domain/unit-state-names'
import type { UnitSummary } from '#shared/types/unit'

export interface StockFilter {
  /** What is typed, as people speak. */
  line: string
  states: readonly UnitState[]
  /** Path of a place, `Long store · L3`; what stands beneath it counts. */
  place: string
  /** A window dragged on the ruler, whole hertz: each piece must cover it wholly. */
  window: { lowerHz: number, upperHz: number } | null
  /** What is looked through, as the count names it: "in stock", "sold and gone". */
  among: string
}

/** Searches pieces already on the page as the line is typed: words with their slips forgiven, and frequencies. */
export function useStockSearch(units: MaybeRefOrGetter<readonly UnitSummary[]>, filter: MaybeRefOrGetter<StockFilter>) {
  const records = computed(() => toValue(units).map(searchRecord))
  const fuse = computed(() => new Fuse<SearchRecord>(records.value, STOCK_INDEX_OPTIONS))
  const query = computed(() => parseFrequencyQuery(toValue(filter).line))
  const asked = computed(() => {
    const { window } = toValue(filter)
    return window ? { ...query.value, wholly: [...query.value.wholly, window] } : query.value
  })
  const standing = computed(() => {
    const { states, place } = toValue(filter)
    return toValue(units).filter(unit =>
      (states.length === 0 || states.includes(unit.state))
      && (place === '' || unit.place?.path === place || unit.place?.path.startsWith(`${place} · `)))
  })
  const hits = computed(() => {
    const words = searchWords(query.value.words)
    const ranks = rankByWords(words, records.value, word => fuse.value.search(word).map(({ item, score }) => ({ tag: item.tag, score: score ?? 1 })))
    return searchStock(standing.value, asked.value, ranks)
  })
  const asksFrequency = computed(() => asksOfCoverage(asked.value))
  const said = computed(() => countInWords(hits.value, toValue(units).length, asksFrequency.value, toValue(filter).among))
  return { query, hits, asksFrequency, said }
}
