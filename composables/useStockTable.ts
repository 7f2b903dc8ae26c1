import type { SortingState } from '@tanstack/vue-table'
import { createSortedRowModel, rowSortingFeature, sortFn_alphanumeric, sortFn_basic, tableFeatures, useTable } from '@tanstack/vue-table'
import type { StockHit } from '#shared/domain/stock-search'
import { UNIT_STATES } from '#shared/domain/unit-state-names'

const features = tableFeatures({
  rowSortingFeature, sortedRowModel: createSortedRowModel(), sortFns: { alphanumeric: sortFn_alphanumeric, basic: sortFn_basic },
})
const lowest = ({ unit }: StockHit) => Math.min(Number.MAX_SAFE_INTEGER, ...unit.bands.map(band => band.lowerHz))

/** What the stock can be sorted by, in the order of the table's columns. */
export const STOCK_COLUMNS = [
  { id: 'piece', header: 'Piece', accessorFn: ({ unit }: StockHit) => `${unit.model.maker} ${unit.model.designation}`, sortFn: 'alphanumeric' as const },
  { id: 'covers', header: 'Covers from', accessorFn: lowest, sortFn: 'basic' as const },
  { id: 'state', header: 'State', accessorFn: ({ unit }: StockHit) => UNIT_STATES.indexOf(unit.state), sortFn: 'basic' as const },
  { id: 'where', header: 'Where', accessorFn: ({ unit }: StockHit) => unit.place?.path ?? '', sortFn: 'alphanumeric' as const },
  { id: 'asking', header: 'Asking', accessorFn: ({ unit }: StockHit) => unit.askingMinor ?? -1, sortFn: 'basic' as const },
]

/** The pieces sorted, those that answer wholly before those that nearly do; for the table and the cards alike. */
export function useStockTable(hits: MaybeRefOrGetter<StockHit[]>, sorting: Ref<SortingState>) {
  const table = useTable({
    features,
    columns: STOCK_COLUMNS,
    data: computed(() => toValue(hits)),
    state: computed(() => ({ sorting: sorting.value })),
    onSortingChange: (next: SortingState | ((old: SortingState) => SortingState)) => {
      sorting.value = typeof next === 'function' ? next(sorting.value) : next
    },
  })
  const rows = computed(() => table.getRowModel().rows.map(row => row.original))
  const groups = computed(() => [
    { name: '', hits: rows.value.filter(hit => hit.answer === 'full') },
    { name: 'Nearly', hits: rows.value.filter(hit => hit.answer === 'nearly') },
  ].filter(group => group.hits.length > 0))
  return { table, columns: STOCK_COLUMNS, rows, groups }
}
