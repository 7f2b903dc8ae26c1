import { readdir } from 'node:fs/promises'
import { dirname, relative, resolve } from 'node:path'
import { fileURLToPath } from 'node:url'
import { get } from '../context'
import type { BenchRows } from '../context'

const pagesFolder = resolve(dirname(fileURLToPath(import.meta.url)), '../../../pages')

/** Pages that only someone who is not signed in sees. */
const forStrangers = new Set(['/sign-in', '/first-run'])

/** Every page that can be opened with nothing but a unit's tag, beside a page of one heading. */
export const rows: BenchRows = async ({ app, bare, browser, tags: [tag = ''] }) => {
  const measured = []
  for (const path of await findPaths(tag)) {
    const url = `${app}${path}`
    const response = await fetch(url, { headers: browser, redirect: 'manual' })
    await response.arrayBuffer()
    // A page that this unit's state closes to it answers with a refusal or leads elsewhere: nothing to measure there.
    if (response.status !== 200) continue
    measured.push({
      name: `Page ${path.replace(tag, ':tag')}`,
      against: 'bare Vue, one heading',
      subject: () => get(url, browser),
      baseline: () => get(`${bare}/page`),
    })
  }
  return measured
}

async function findPaths(tag: string): Promise<string[]> {
  const entries = await readdir(pagesFolder, { recursive: true, withFileTypes: true })
  return entries
    .filter(entry => entry.isFile() && entry.name.endsWith('.vue'))
    .map(entry => `/${relative(pagesFolder, resolve(entry.parentPath, entry.name))}`)
    .map(path => path.replace(/\.vue$/, '').replace(/\/index$/, '').replace('/units/[tag]', `/units/${tag}`) || '/')
    .filter(path => !path.includes('[') && !forStrangers.has(path))
    .sort()
}
