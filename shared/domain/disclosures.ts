/**
 * What a buyer must be told. A unit is not offerable until each is answered or says which kind of "not known" it is
 * (common practice, no source: the list follows what buyers ask and why pieces come back).
 */
export const DISCLOSURE_KEYS = [
  'identity', 'working_state', 'tests', 'changes', 'safety', 'supply', 'cosmetic_front', 'cosmetic_left', 'cosmetic_right',
  'cosmetic_rear', 'cosmetic_top', 'cosmetic_underneath', 'included', 'missing', 'behaviour', 'terms',
] as const
export type DisclosureKey = (typeof DISCLOSURE_KEYS)[number]

export interface DisclosureTopic { label: string, question: string, group: DisclosureGroup }
export const DISCLOSURE_GROUPS = ['What it is', 'How it works', 'How it looks', 'What comes with it', 'On what terms'] as const
export type DisclosureGroup = (typeof DISCLOSURE_GROUPS)[number]

export const DISCLOSURES: Record<DisclosureKey, DisclosureTopic> = {
  identity: { label: 'Identity', question: 'Suffix, variant, year range, and how that was judged', group: 'What it is' },
  working_state: { label: 'State', question: 'Working to stated limits, working with stated faults, powers and no more, untested and why, or for parts', group: 'How it works' },
  tests: { label: 'Tests', question: 'What was tested, and what was not', group: 'How it works' },
  changes: { label: 'Repairs and changes', question: 'What is not original, beyond the work log', group: 'How it works' },
  safety: { label: 'Safety', question: 'Class, lead, fuse, earth or insulation result, advice, hazards inside', group: 'How it works' },
  supply: { label: 'Supply', question: 'Voltage setting as sent, selectable range, frequency, plug fitted', group: 'How it works' },
  cosmetic_front: { label: 'Front', question: 'Marks in millimetres, paint, lettering, knobs, dial', group: 'How it looks' },
  cosmetic_left: { label: 'Left side', question: 'Dents, scratches, paint', group: 'How it looks' },
  cosmetic_right: { label: 'Right side', question: 'Dents, scratches, paint', group: 'How it looks' },
  cosmetic_rear: { label: 'Rear', question: 'Sockets, added holes, paint', group: 'How it looks' },
  cosmetic_top: { label: 'Top', question: 'Scratches, handle, rust', group: 'How it looks' },
  cosmetic_underneath: { label: 'Underneath', question: 'Feet, rust, labels', group: 'How it looks' },
  included: { label: 'Included', question: 'What leaves with it', group: 'What comes with it' },
  missing: { label: 'Not included', question: 'What was supplied originally and is not here', group: 'What comes with it' },
  behaviour: { label: 'Behaviour', question: 'Warm-up, drift, noises normal for the type', group: 'How it works' },
  terms: { label: 'Terms', question: 'As seen, returns, warranty and what it excludes, carriage back', group: 'On what terms' },
}
