import { resolve } from 'node:path'
import { fileDriver, fileStoreConfig } from '../utils/file-store'

/** Mounts where photos and documents live: a folder, or an S3-compatible bucket when one is configured. */
export default defineNitroPlugin(() => {
  const { filesDir, s3 } = fileStoreConfig.parse(useRuntimeConfig())
  useStorage().mount('files', fileDriver({ filesDir: resolve(filesDir), s3 }))
})
