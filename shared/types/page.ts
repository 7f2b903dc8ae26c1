/** A page of a list. `nextCursor` is opaque; null at the end. */
export interface Page<Item> { items: Item[], nextCursor: string | null, total?: number }
