import { readFile } from 'node:fs/promises'
import { fileURLToPath } from 'node:url'
import { create } from 'fontkit'

/** The weights that the product's faces have. */
export type FontWeight = 400 | 500 | 600 | 700

/** One shipped font file: its name is what it is registered under in a PDF. */
export interface Face {
  name: string
  bytes: Uint8Array
  /** Code points it has a drawing for. */
  covers: ReadonlySet<number>
}

/** For each weight the faces in the order they are asked for a character: Work Sans, its extension, then DejaVu Sans. */
export type FaceStack = readonly Face[]
export type PdfFonts = Readonly<Record<FontWeight, FaceStack>>

/** Gives the bytes of a file in `server/assets/fonts`, by its name. */
export type FontReader = (file: string) => Promise<Uint8Array>

const STACKS: Record<FontWeight, readonly string[]> = {
  400: ['work-sans-latin-400-normal.woff', 'work-sans-latin-ext-400-normal.woff', 'dejavu-sans-400-normal.woff'],
  500: ['work-sans-latin-500-normal.woff', 'work-sans-latin-ext-500-normal.woff', 'dejavu-sans-400-normal.woff'],
  600: ['work-sans-latin-600-normal.woff', 'work-sans-latin-ext-600-normal.woff', 'dejavu-sans-700-normal.woff'],
  700: ['work-sans-latin-700-normal.woff', 'work-sans-latin-ext-700-normal.woff', 'dejavu-sans-700-normal.woff'],
}

/** Where the sources lie: right for tests and scripts; the built server sets its own reader. */
const fromSources: FontReader = file => readFile(fileURLToPath(new URL(`../../assets/fonts/${file}`, import.meta.url)))

let reader = fromSources
let loaded: Promise<PdfFonts> | undefined

/** Called once as the server starts, for there the fonts are inside the bundle and not beside the source. */
export function setFontReader(read: FontReader): void {
  reader = read
  loaded = undefined
}

async function loadFace(file: string): Promise<Face> {
  const bytes = Buffer.from(await reader(file))
  const font = create(bytes)
  if (!('characterSet' in font)) throw new Error(`${file} is a collection, not one font`)
  return { name: file.replace('-normal.woff', ''), bytes, covers: new Set(font.characterSet) }
}

async function loadAll(): Promise<PdfFonts> {
  const files = [...new Set(Object.values(STACKS).flat())]
  const faces = new Map(await Promise.all(files.map(async file => [file, await loadFace(file)] as const)))
  const stack = (weight: FontWeight): FaceStack => STACKS[weight].map((file) => {
    const face = faces.get(file)
    if (!face) throw new Error(`The font ${file} was not loaded`)
    return face
  })
  return { 400: stack(400), 500: stack(500), 600: stack(600), 700: stack(700) }
}

/** The product's faces, read once and kept. */
export function loadFonts(): Promise<PdfFonts> {
  loaded ??= loadAll().catch((error: unknown) => {
    loaded = undefined
    throw error
  })
  return loaded
}
