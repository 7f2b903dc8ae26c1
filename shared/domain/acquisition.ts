/** Whose the piece is. A consigned piece is never counted as the shop's stock value. */
export const OWNERSHIPS = ['bought', 'consigned'] as const
export type Ownership = (typeof OWNERSHIPS)[number]
export const OWNERSHIP_LABELS: Record<Ownership, string> = { bought: 'Bought', consigned: 'On consignment' }

/** Where a piece came from. */
export const SOURCE_KINDS = ['house_clearance', 'auction', 'club_sale', 'private_seller', 'surplus', 'trade', 'trade_in', 'consignor', 'not_known'] as const
export type SourceKind = (typeof SOURCE_KINDS)[number]
export const SOURCE_KIND_LABELS: Record<SourceKind, string> = {
  house_clearance: 'House clearance or estate',
  auction: 'Auction',
  club_sale: 'Club sale or rally table',
  private_seller: 'Private seller',
  surplus: 'School, laboratory or services surplus',
  trade: 'Another dealer',
  trade_in: 'Part exchange',
  consignor: 'Consignor',
  not_known: 'Not known',
}
