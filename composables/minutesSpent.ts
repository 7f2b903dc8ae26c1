import type { ModificationView } from '#shared/types/modification'

/** Minutes of work of ours that stand in a unit's log, as the server counts them; one entry may be left out while it is corrected. */
export const minutesSpent = (entries: readonly Pick<ModificationView, 'id' | 'hand' | 'minutes' | 'withdrawnBecause'>[], exceptId?: string): number => entries
  .filter(entry => entry.hand === 'done_by_us' && entry.withdrawnBecause === null && entry.id !== exceptId)
  .reduce((sum, { minutes }) => sum + (minutes ?? 0), 0)
