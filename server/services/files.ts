import { createHash, randomUUID } from 'node:crypto'
import type { FileStore } from '../utils/file-store'

/** SHA-256 of the bytes as they were sent, in hexadecimal: the same bytes twice are one file. */
export const hashBytes = (bytes: Uint8Array) => createHash('sha256').update(bytes).digest('hex')

export interface StoredFile { key: string, bytes: Uint8Array }

/**
 * Stores files under a new id, then lets the caller write their rows. When that fails (or finds that it needs none and
 * answers `keep: false`), the bytes are taken away again, so that the store holds nothing the database doesn't know.
 */
export async function storeThenWrite<T>(
  store: FileStore, makeFiles: (fileId: string) => StoredFile[], write: (fileId: string) => Promise<{ keep: boolean, result: T }>,
): Promise<T> {
  const fileId = randomUUID()
  const files = makeFiles(fileId)
  let kept = false
  try {
    for (const { key, bytes } of files) await store.put(key, bytes)
    const { keep, result } = await write(fileId)
    kept = keep
    return result
  } finally {
    if (!kept) await Promise.allSettled(files.map(({ key }) => store.remove(key)))
  }
}
