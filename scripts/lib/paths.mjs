import { dirname, join, resolve } from 'node:path'
import { fileURLToPath } from 'node:url'

/** The folder that holds package.json. */
export const root = resolve(dirname(fileURLToPath(import.meta.url)), '../..')

/** Everything that belongs to this copy of Knurl and to no release: clusters, secrets, photos. */
export const dataDir = join(root, '.data')

/** @param {...string} parts */
export const inRoot = (...parts) => join(root, ...parts)

/** @param {...string} parts */
export const inData = (...parts) => join(dataDir, ...parts)
