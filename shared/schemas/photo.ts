import { z } from 'zod'
import { PHOTO_SUBJECTS } from '../domain/photos'
import { PHOTO_FORMATS, PHOTO_WIDTHS } from '../domain/photo-sizes'
import { line, optionalLine, uuid, versionSeen } from './common'

const subject = z.enum(PHOTO_SUBJECTS, { error: 'Choose what the photo shows' })
const caption = optionalLine('the caption', 200)

/** What is sent beside a photo's file. */
export const newPhoto = z.object({
  subject,
  caption,
  modificationId: z.preprocess(value => value === '' ? undefined : value, uuid('an entry of the work log').optional()),
  /** The reading of a test sheet whose waveform it shows. */
  readingId: z.preprocess(value => value === '' ? undefined : value, uuid('a reading of a test sheet').optional()),
})
export type NewPhoto = z.output<typeof newPhoto>

export const changedPhoto = z.object({
  subject: subject.optional(),
  caption: caption.optional(),
  /** Its place among the photos of the unit that show the same. */
  position: z.int({ error: 'The place in the row must be a whole number' }).min(0, 'The place in the row must be 0 or more').max(1000, 'The place in the row must be 1000 or less').optional(),
  isPublic: z.boolean({ error: 'Say whether the buyer’s sheet may show it' }).optional(),
  version: versionSeen,
})
export type ChangedPhoto = z.output<typeof changedPhoto>

export const removal = z.object({ why: line('why it is removed', 400) })

/** The last part of a photo's address: `800.webp`. */
export const photoFileParams = z.object({
  id: z.uuid('There is no such photo.'),
  size: z.string().regex(new RegExp(`^(${PHOTO_WIDTHS.join('|')})\\.(${PHOTO_FORMATS.join('|')})$`), 'There is no such size of a photo.').transform((text) => {
    const [width, format] = text.split('.')
    return { width: PHOTO_WIDTHS.find(each => String(each) === width) ?? 320, format: PHOTO_FORMATS.find(each => each === format) ?? 'webp' }
  }),
})
