/** The four kinds of people who sign in, and what each may do. One table, read by the server's guard and by the pages. */
export const ROLES = ['owner', 'bench', 'floor', 'reader'] as const
export type Role = (typeof ROLES)[number]

export const ROLE_LABELS: Record<Role, string> = {
  owner: 'Owner',
  bench: 'Bench',
  floor: 'Floor',
  reader: 'Reader',
}

/** One line for the person who is about to hand out the role. */
export const ROLE_HINTS: Record<Role, string> = {
  owner: 'Everything: buying, prices, selling, publishing, people and settings',
  bench: 'Triage, work, test sheets; sees what a piece cost',
  floor: 'Receives, labels, shelves, moves, packs, logs what they see; never sees cost',
  reader: 'Reads stock without money; writes nothing',
}

const everyone: readonly Role[] = ROLES
const hands: readonly Role[] = ['owner', 'bench', 'floor']
const skilled: readonly Role[] = ['owner', 'bench']
const ownerOnly: readonly Role[] = ['owner']

/** What a route may ask for. Named thing.deed; the roles that hold it. */
export const PERMISSIONS = {
  'stock.read': everyone,
  /** What a piece cost, minutes as money, margin. */
  'cost.read': skilled,
  /** The asking price: on the shelf ticket, so the floor sees it; a reader does not. */
  'price.read': hands,
  'price.write': ownerOnly,
  /** Names and addresses of those we bought from and sold to. */
  'parties.read': skilled,
  'unit.book-in': hands,
  'unit.edit': hands,
  'unit.move': hands,
  'unit.log': hands,
  'unit.triage': skilled,
  'unit.test': skilled,
  'unit.price': ownerOnly,
  'unit.offer': ownerOnly,
  'unit.sell': ownerOnly,
  'unit.write-off': ownerOnly,
  'disclosure.write': skilled,
  'provenance.publish': ownerOnly,
  'model.write': skilled,
  'location.write': hands,
  'instrument.write': skilled,
  /** Entering, counting and moving lots of parts. */
  'part.write': hands,
  /** Breaking a unit for parts, withdrawing a lot, raising a recall. */
  'part.decide': skilled,
  'label.print': hands,
  'people.manage': ownerOnly,
  'shop.manage': ownerOnly,
} as const satisfies Record<string, readonly Role[]>

export type Permission = keyof typeof PERMISSIONS

/** Whether a role holds a permission. */
export function may(role: Role, permission: Permission): boolean {
  const holders: readonly Role[] = PERMISSIONS[permission]
  return holders.includes(role)
}
