import { fileTypeFromBuffer } from 'file-type'
import type { Metadata, Sharp } from 'sharp'
import sharp from 'sharp'
import type { PhotoFormat, PhotoSize } from '../../shared/domain/photo-sizes'
import { MAX_PHOTO_BYTES, MAX_PHOTO_PIXELS, photoSizes } from '../../shared/domain/photo-sizes'
import { invalid, tooLarge, wrongMediaType } from './errors'

const ACCEPTED = new Set(['image/jpeg', 'image/png', 'image/webp', 'image/avif'])
const DAMAGED = 'This picture is damaged or only half arrived. Send it again, or take it again.'

/** The picture everything else is made from: turned upright, without EXIF or position, at most this wide and high. */
const MASTER_EDGE = 2400
const MASTER_QUALITY = 92
const QUALITY: Record<PhotoFormat, number> = { webp: 80, avif: 55 }

export interface PreparedPhoto {
  /** A JPEG without EXIF. */
  master: Buffer
  /** Pixels of the master, after orientation. */
  width: number
  height: number
  webp: { size: PhotoSize, bytes: Buffer }[]
}

const isHeic = (mime: string) => mime.startsWith('image/hei')

/** What the bytes are, whatever their name says. Throws 413, 415 or 422 with a sentence for whoever took the picture. */
async function inspect(bytes: Uint8Array): Promise<void> {
  if (bytes.byteLength > MAX_PHOTO_BYTES) throw tooLarge(`The picture is more than ${MAX_PHOTO_BYTES / 1_000_000} MB. Send a smaller one.`)
  const type = await fileTypeFromBuffer(bytes)
  if (type && isHeic(type.mime)) {
    throw wrongMediaType('This is a HEIC picture, which browsers cannot show. Set the phone’s camera to its most compatible format, or send the picture as a JPEG.')
  }
  if (!type || !ACCEPTED.has(type.mime)) throw wrongMediaType('This is not a picture Knurl keeps, whatever its name says. Send a JPEG, PNG, WebP or AVIF.')
  const { width, height } = await readSize(bytes)
  if (width * height > MAX_PHOTO_PIXELS) {
    throw tooLarge(`The picture has ${Math.round(width * height / 1_000_000)} megapixels; the most is ${MAX_PHOTO_PIXELS / 1_000_000}. Send a smaller one.`)
  }
}

/** Reads the header only: nothing is decoded yet, so a small file that unpacks into a huge picture costs nothing. */
async function readSize(bytes: Uint8Array): Promise<Metadata> {
  try {
    return await sharp(bytes, { limitInputPixels: false }).metadata()
  } catch {
    throw invalid([{ path: 'file', message: DAMAGED }])
  }
}

/** Turned upright and laid on white; sharp leaves EXIF, position and every other tag behind unless told to keep them. */
function upright(bytes: Uint8Array): Sharp {
  return sharp(bytes, { limitInputPixels: MAX_PHOTO_PIXELS, failOn: 'error' }).autoOrient().flatten({ background: '#ffffff' })
    .resize({ width: MASTER_EDGE, height: MASTER_EDGE * 4, fit: 'inside', withoutEnlargement: true }).toColourspace('srgb')
}

/**
 * Judges a picture by its content and makes what is shown of it at once. Throws 413 when it is too large, 415 when it is
 * no picture of an accepted kind, 422 when it is damaged.
 */
export async function preparePhoto(bytes: Uint8Array): Promise<PreparedPhoto> {
  await inspect(bytes)
  const { data: master, info } = await decode(bytes)
  const webp = []
  for (const size of photoSizes(info.width, info.height)) webp.push({ size, bytes: await renderPhoto(master, size, 'webp') })
  return { master, width: info.width, height: info.height, webp }
}

async function decode(bytes: Uint8Array) {
  try {
    return await upright(bytes).jpeg({ quality: MASTER_QUALITY, chromaSubsampling: '4:4:4' }).toBuffer({ resolveWithObject: true })
  } catch {
    throw invalid([{ path: 'file', message: DAMAGED }])
  }
}

/** One size of a master, encoded. AVIF takes seconds: only in the background. */
export async function renderPhoto(master: Uint8Array, size: PhotoSize, format: PhotoFormat): Promise<Buffer> {
  const scaled = sharp(master).resize(size.pixelWidth, size.pixelHeight, { fit: 'fill' })
  const quality = QUALITY[format]
  return format === 'avif' ? scaled.avif({ quality, effort: 4 }).toBuffer() : scaled.webp({ quality }).toBuffer()
}
