import { execFile } from 'node:child_process'
import { mkdtemp, readdir, readFile, rm, writeFile } from 'node:fs/promises'
import { createRequire } from 'node:module'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { promisify } from 'node:util'
import { prepareZXingModule, readBarcodes } from 'zxing-wasm/reader'
import type { ReadResult } from 'zxing-wasm/reader'

const run = promisify(execFile)

/** A page as grey levels, one byte a pixel. */
export interface GreyImage { width: number, height: number, data: Uint8Array }

/** Rasterises every page of a PDF with poppler. */
export async function rasterise(pdf: Uint8Array, dpi: number): Promise<GreyImage[]> {
  const folder = await mkdtemp(join(tmpdir(), 'knurl-raster-'))
  try {
    await writeFile(join(folder, 'in.pdf'), pdf)
    await run('pdftoppm', ['-r', String(dpi), '-gray', 'in.pdf', 'page'], { cwd: folder })
    const files = (await readdir(folder)).filter(name => name.endsWith('.pgm')).sort()
    return await Promise.all(files.map(async name => readPgm(await readFile(join(folder, name)))))
  } finally {
    await rm(folder, { recursive: true, force: true })
  }
}

/** Reads a binary PGM of 8 bits, as poppler writes it. */
function readPgm(bytes: Buffer): GreyImage {
  const header = /^P5\s+(\d+)\s+(\d+)\s+255\s/.exec(bytes.subarray(0, 64).toString('latin1'))
  if (!header) throw new Error('This is not a PGM of 8 bits')
  return { width: Number(header[1]), height: Number(header[2]), data: new Uint8Array(bytes.subarray(header[0].length)) }
}

/** A part of an image, in pixels. */
export function crop(image: GreyImage, x: number, y: number, width: number, height: number): GreyImage {
  const data = new Uint8Array(width * height).fill(255)
  for (let row = 0; row < height; row++) {
    const from = (y + row) * image.width + x
    data.set(image.data.subarray(from, Math.min(from + width, (y + row + 1) * image.width)), row * width)
  }
  return { width, height, data }
}

let prepared: Promise<unknown> | undefined

/** Reads every QR code and Code 128 in an image, by a decoder that had no part in writing them. */
export async function decode(image: GreyImage): Promise<ReadResult[]> {
  prepared ??= prepare()
  await prepared
  const words = Uint32Array.from(image.data, grey => 0xFF000000 + grey * 0x010101)
  const rgba = new Uint8ClampedArray(words.buffer)
  return readBarcodes({ data: rgba, width: image.width, height: image.height, colorSpace: 'srgb' }, { formats: ['QRCode', 'Code128'], tryHarder: true, maxNumberOfSymbols: 8 })
}

async function prepare(): Promise<void> {
  const file = createRequire(import.meta.url).resolve('zxing-wasm/reader/zxing_reader.wasm')
  const bytes = await readFile(file)
  await prepareZXingModule({ overrides: { wasmBinary: new Uint8Array(bytes).buffer }, fireImmediately: true })
}
