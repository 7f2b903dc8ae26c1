/**
 * The sizes a photo is kept in. The numbers are also the last part of its address (`/api/photos/ID/800.webp`), so they
 * outlive a release.
 */
export const PHOTO_WIDTHS = [320, 800, 1600] as const
export type PhotoWidth = (typeof PHOTO_WIDTHS)[number]

export const PHOTO_FORMATS = ['webp', 'avif'] as const
export type PhotoFormat = (typeof PHOTO_FORMATS)[number]

/** What may be sent: bytes of one file, and pixels once decoded. */
export const MAX_PHOTO_BYTES = 25_000_000
export const MAX_PHOTO_PIXELS = 60_000_000
export const MAX_DOCUMENT_BYTES = 50_000_000

/** A picture taller than this many widths is scaled down by its height, so that no size outgrows what WebP holds (16383 px). */
const TALLEST = 8

export interface PhotoSize { width: PhotoWidth, pixelWidth: number, pixelHeight: number }

/**
 * The sizes made of a picture of so many pixels (after orientation), smallest first. Nothing is enlarged: the first
 * size that would be is made at the picture's own size, and none after it.
 */
export function photoSizes(pixelWidth: number, pixelHeight: number): PhotoSize[] {
  const sizes: PhotoSize[] = []
  for (const width of PHOTO_WIDTHS) {
    const scale = Math.min(1, width / pixelWidth, width * TALLEST / pixelHeight)
    sizes.push({ width, pixelWidth: Math.max(1, Math.round(pixelWidth * scale)), pixelHeight: Math.max(1, Math.round(pixelHeight * scale)) })
    if (scale === 1) break
  }
  return sizes
}

/** The smallest made size that is at least as wide as asked for, else the largest made. */
export function nearestSize(sizes: readonly PhotoSize[], wanted: PhotoWidth): PhotoSize | undefined {
  return sizes.find(size => size.width >= wanted) ?? sizes.at(-1)
}

/** Where a size of a photo is served to staff. */
export function photoUrl(photoId: string, width: PhotoWidth, format: PhotoFormat = 'webp'): string {
  return `/api/photos/${photoId}/${width}.${format}`
}
