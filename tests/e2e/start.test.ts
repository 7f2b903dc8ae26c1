import { describe, expect, it } from 'vitest'
import { useTestServer } from '../support/server'
import { useBrowser, visit } from '../support/browser'

describe('the built application on an empty database', () => {
  const server = useTestServer()
  const open = useBrowser()

  it('answers the browser and gives it nothing to complain of', async () => {
    const page = await open(server().url, { viewport: 'phone' })
    await visit(page, '/')
    expect(await page.title()).not.toBe('')
    page.expectClean()
  })

  it('tells a script that an address of the API does not exist, as problem details', async () => {
    const response = await fetch(`${server().url}/api/nothing-here`)
    expect(response.status).toBe(404)
    expect(response.headers.get('content-type')).toContain('application/problem+json')
  })
})
