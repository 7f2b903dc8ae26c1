import sharp from 'sharp'

/** A flat picture of some size, as a JPEG unless another format is named. `shade` makes different bytes. */
export async function makePicture(width: number, height: number, { format = 'jpeg', shade = 120 }: { format?: 'jpeg' | 'png' | 'webp' | 'avif', shade?: number } = {}): Promise<Buffer> {
  return sharp({ create: { width, height, channels: 3, background: { r: shade, g: 140, b: 110 } } }).toFormat(format).toBuffer()
}

/** A JPEG lying on its side (orientation 6: turn a quarter clockwise), taken at a place that its EXIF gives away. */
export async function makePhoneJpeg(width: number, height: number): Promise<Buffer> {
  return sharp({ create: { width, height, channels: 3, background: '#557766' } }).jpeg().withMetadata({ orientation: 6 }).withExifMerge({
    IFD0: { Make: 'Oxmarden', Model: 'Pocket camera' },
    IFD3: { GPSLatitudeRef: 'N', GPSLatitude: '51/1 30/1 0/1', GPSLongitudeRef: 'W', GPSLongitude: '0/1 7/1 0/1' },
  }).toBuffer()
}

/** A JPEG with detail, so that cutting it leaves its picture half drawn. */
export async function makeNoisyJpeg(width: number, height: number): Promise<Buffer> {
  const pixels = Buffer.alloc(width * height * 3)
  let seed = 7
  for (let index = 0; index < pixels.length; index++) {
    seed = (seed * 1_103_515_245 + 12_345) % 2_147_483_648
    pixels[index] = seed % 256
  }
  return sharp(pixels, { raw: { width, height, channels: 3 } }).jpeg().toBuffer()
}

/** The smallest PDF that is one (ISO 32000-1, 7.5): a header, objects, a cross-reference table that its end points at. */
export function makePdf(note = ''): Buffer {
  const body = `%PDF-1.4\n% ${note}\n1 0 obj\n<< /Type /Catalog /Pages 2 0 R >>\nendobj\n2 0 obj\n<< /Type /Pages /Kids [] /Count 0 >>\nendobj\n`
  const offset = (object: string) => String(body.indexOf(object)).padStart(10, '0')
  const table = `xref\n0 3\n0000000000 65535 f \n${offset('1 0 obj')} 00000 n \n${offset('2 0 obj')} 00000 n \n`
  return Buffer.from(`${body}${table}trailer\n<< /Size 3 /Root 1 0 R >>\nstartxref\n${body.length}\n%%EOF\n`, 'latin1')
}
