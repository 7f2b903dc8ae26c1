import { createStorage } from 'unstorage'
import memory from 'unstorage/drivers/memory'
import { fileStoreOn } from '../../server/utils/file-store'
import type { FileStore } from '../../server/utils/file-store'

/** A file store that forgets everything with the test, and says what it holds. */
export function makeMemoryFileStore(): FileStore & { keys: () => Promise<string[]> } {
  const storage = createStorage({ driver: memory() })
  return { ...fileStoreOn(storage), keys: async () => (await storage.getKeys()).sort() }
}
