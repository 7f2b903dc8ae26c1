import wasmUrl from 'zxing-wasm/reader/zxing_reader.wasm?url'

/** A code seen in a picture, with where its middle is, as shares of the picture's width and height. */
export interface SeenCode { text: string, x: number, y: number }

/** The decoder that the application ships; fetched when the camera is first opened, and kept. */
let loading: Promise<(picture: ImageData) => Promise<SeenCode[]>> | undefined

async function load(): Promise<(picture: ImageData) => Promise<SeenCode[]>> {
  const { prepareZXingModule, readBarcodes } = await import('zxing-wasm/reader')
  await prepareZXingModule({
    overrides: { locateFile: (path: string, prefix: string) => path.endsWith('.wasm') ? wasmUrl : prefix + path },
    fireImmediately: true,
  })
  return async (picture) => {
    const found = await readBarcodes(picture, { formats: ['QRCode', 'Code128'], tryHarder: true, maxNumberOfSymbols: 6 })
    return found.filter(({ isValid }) => isValid).map(({ text, position }) => ({
      text,
      x: (position.topLeft.x + position.bottomRight.x) / 2 / picture.width,
      y: (position.topLeft.y + position.bottomRight.y) / 2 / picture.height,
    }))
  }
}

/** Gives the decoder, asking the server for it only once a visit. */
export function loadCodeDecoder() {
  loading ??= load().catch((error: unknown) => {
    loading = undefined
    throw error
  })
  return loading
}
