/** What a photo shows, in the order a buyer wants to see them. */
export const PHOTO_SUBJECTS = ['front', 'plate', 'left', 'right', 'rear', 'top', 'underneath', 'inside', 'powered', 'detail', 'before', 'after', 'kit', 'packing'] as const
export type PhotoSubject = (typeof PHOTO_SUBJECTS)[number]
export const PHOTO_SUBJECT_LABELS: Record<PhotoSubject, string> = {
  front: 'Front', plate: 'Serial plate', left: 'Left side', right: 'Right side', rear: 'Rear', top: 'Top',
  underneath: 'Underneath', inside: 'Inside', powered: 'Powered', detail: 'Detail', before: 'Before', after: 'After',
  kit: 'Everything included', packing: 'Packing on arrival',
}
