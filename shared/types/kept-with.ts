import type { KeptWithKind, Originality, Whereabouts } from '../domain/kept-with'
import type { PlaceView } from './unit'

export interface KeptWithView {
  tag: string
  kind: KeptWithKind
  description: string
  originality: Originality
  condition: string
  whereabouts: Whereabouts
  place: PlaceView | null
  missingSince: string | null
  absenceDisclosed: string
  packedAt: string | null
  version: number
}
