import type { Driver, Storage } from 'unstorage'
import fsDriver from 'unstorage/drivers/fs'
import s3Driver from 'unstorage/drivers/s3'
import { z } from 'zod'

/** Where photos and documents live. Keys are path-like: `photos/ID/800.webp`. */
export interface FileStore {
  put: (key: string, bytes: Uint8Array) => Promise<void>
  /** The bytes, or null when there are none under this key. */
  get: (key: string) => Promise<Buffer | null>
  has: (key: string) => Promise<boolean>
  /** Removing what is not there is no error. */
  remove: (key: string) => Promise<void>
}

/** What the server's configuration says of it (`NUXT_FILES_DIR`, `NUXT_S3_BUCKET` …). */
export const fileStoreConfig = z.object({
  /** A folder on this machine; used when no bucket is named. */
  filesDir: z.string().min(1),
  s3: z.object({ bucket: z.string(), endpoint: z.string(), region: z.string(), accessKeyId: z.string(), secretAccessKey: z.string() }),
})

/** The driver that the configuration asks for: an S3-compatible bucket if one is named, else a folder. */
export function fileDriver({ filesDir, s3 }: z.output<typeof fileStoreConfig>): Driver {
  if (!s3.bucket) return fsDriver({ base: filesDir, noClear: true })
  const missing = (['endpoint', 'region', 'accessKeyId', 'secretAccessKey'] as const).filter(name => !s3[name])
  if (missing.length > 0) throw new Error(`The S3 file store is half configured: ${missing.join(', ')} is not set`)
  return s3Driver(s3)
}

/** A file store on any unstorage storage. `base` is the mount it lives under, if it is not the whole storage. */
export function fileStoreOn(storage: Storage, base = ''): FileStore {
  const at = (key: string) => base ? `${base}:${key}` : key
  return {
    async put(key, bytes) {
      await storage.setItemRaw(at(key), Buffer.from(bytes.buffer, bytes.byteOffset, bytes.byteLength))
    },
    async get(key) {
      const bytes: unknown = await storage.getItemRaw(at(key))
      if (bytes === null || bytes === undefined) return null
      if (bytes instanceof ArrayBuffer) return Buffer.from(bytes)
      if (bytes instanceof Uint8Array) return Buffer.from(bytes.buffer, bytes.byteOffset, bytes.byteLength)
      throw new TypeError('The file store answered with something other than bytes')
    },
    has: key => storage.hasItem(at(key)),
    async remove(key) {
      if (await storage.hasItem(at(key))) await storage.removeItem(at(key))
    },
  }
}

/** The running server's file store, mounted by the `files` plugin. */
export const useFileStore = (): FileStore => fileStoreOn(useStorage(), 'files')
