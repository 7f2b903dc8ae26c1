import { PHOTO_SUBJECT_LABELS } from '#shared/domain/photos'
import type { PhotoView } from '#shared/types/photo'

/** A photo in words: "Front: with the dial lit". */
export const photoName = (photo: Pick<PhotoView, 'subject' | 'caption'>) => [PHOTO_SUBJECT_LABELS[photo.subject], photo.caption].filter(Boolean).join(': ')
