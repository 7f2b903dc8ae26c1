import { setFontReader } from '../utils/pdf/fonts'

/** In the built server the fonts are inside the bundle; PDFs read them from there. */
export default defineNitroPlugin(() => {
  const files = useStorage('assets:server:fonts')
  setFontReader(async (file) => {
    const bytes = await files.getItemRaw<Uint8Array>(file)
    if (!bytes) throw new Error(`The font ${file} is missing from the build`)
    return bytes
  })
})
