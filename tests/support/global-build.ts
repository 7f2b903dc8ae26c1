import { build, isBuilt } from '../../scripts/lib/build.mjs'

/** The browser tests run against the built application: builds it where the sources have changed since. */
export default async function setup(): Promise<void> {
  if (!isBuilt()) await build()
}
