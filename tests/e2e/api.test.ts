import { beforeAll, describe, expect, it } from 'vitest'
import { openShop } from '../../server/services/first-run'
import { makeToken } from '../../server/services/tokens'
import { writePerson } from '../../server/services/people'
import type { May } from '../../server/utils/guard'
import type { Role } from '../../shared/domain/roles'
import { may, ROLES } from '../../shared/domain/roles'
import { useTestServer } from '../support/server'

const PASSWORD = 'anode-vernier-brass-2207'
const server = useTestServer()
const tokens = new Map<Role, string>()

interface Operation { 'x-may': May, 'summary': string }
interface Description { openapi: string, paths: Record<string, Record<string, Operation>> }
let routes: { method: string, path: string, may: May, summary: string }[] = []

/** An address for a path of the description; what it names need not exist: who may is asked first. */
const fill = (path: string) => path.replaceAll(/\{(\w+)\}/g, (_, name: string) => ({ tag: 'U0000016', number: '1', size: '320.webp', token: 'x'.repeat(32) })[name] ?? '00000000-0000-4000-8000-000000000000')

async function call(method: string, path: string, options: { role?: Role, body?: string, type?: string } = {}) {
  const token = options.role ? tokens.get(options.role) : undefined
  const answer = await fetch(server().url + path, {
    method, redirect: 'manual', body: options.body,
    headers: { ...token ? { authorization: `Bearer ${token}` } : {}, ...options.body === undefined ? {} : { 'content-type': options.type ?? 'application/json' } },
  })
  return { status: answer.status, type: answer.headers.get('content-type') ?? '', text: await answer.text() }
}

beforeAll(async () => {
  const { db } = server().database
  const owner = await openShop(db, { name: 'Odile', email: 'owner@shop.invalid', password: PASSWORD, shopName: 'Fenwold Instruments', currency: 'GBP', timeZone: 'Europe/London', ituRegion: 1 })
  for (const role of ROLES) {
    const id = role === 'owner' ? owner.id : await writePerson(db, owner, { name: role, email: `${role}@shop.invalid`, role, password: PASSWORD, mustChangePassword: false })
    tokens.set(role, (await makeToken(db, { id }, 'test')).token)
  }
  const description: Description = await (await fetch(`${server().url}/api/openapi.json`)).json()
  routes = Object.entries(description.paths).flatMap(([path, methods]) =>
    Object.entries(methods).map(([method, operation]) => ({ method: method.toUpperCase(), path: fill(path), may: operation['x-may'], summary: operation.summary })))
})

describe('every route', () => {
  it('is described, says who may and what it does', () => {
    expect(routes.length).toBeGreaterThan(60)
    expect(routes.filter(route => !route.may || !route.summary)).toEqual([])
  })

  it('refuses a stranger with 401 as problem details, unless anyone may come', async () => {
    for (const route of routes.filter(each => each.may !== 'anyone')) {
      const answer = await call(route.method, route.path)
      expect([`${route.method} ${route.path}`, answer.status, answer.type.split(';')[0]]).toEqual([`${route.method} ${route.path}`, 401, 'application/problem+json'])
    }
  })

  it('refuses every role that does not hold its permission with 403', async () => {
    for (const { method, path, may: needed } of routes) {
      if (needed === 'anyone' || needed === 'signed-in') continue
      for (const role of ROLES.filter(each => !may(each, needed))) {
        const answer = await call(method, path, { role })
        expect([`${role}: ${method} ${path}`, answer.status]).toEqual([`${role}: ${method} ${path}`, 403])
      }
    }
  })
})

describe('bad input', () => {
  const refused: [what: string, method: string, path: string, body: string | undefined, status: number][] = [
    ['a body that is not JSON', 'POST', '/api/units', '{"modelId":', 400],
    ['a missing field', 'POST', '/api/units', '{}', 422],
    ['wrong types', 'POST', '/api/units', '{"modelId":7,"serial":["a"],"kit":"all"}', 422],
    ['ten megabytes of text', 'POST', '/api/models', JSON.stringify({ maker: 'x'.repeat(10_000_000) }), 413],
    ['a unit that does not exist', 'GET', '/api/units/U9999991', undefined, 404],
    ['a tag with one wrong character', 'GET', '/api/units/U0000017', undefined, 404],
    ['a frequency of zero', 'GET', '/api/units?covers=0', undefined, 400],
    ['a frequency below zero', 'GET', '/api/units?covers=-1', undefined, 400],
    ['a frequency beyond sense', 'GET', '/api/units?covers=1e30', undefined, 400],
    ['a frequency that is none', 'GET', '/api/units?covers=banana', undefined, 400],
    ['a limit of none', 'GET', '/api/units?limit=0', undefined, 400],
    ['a cursor of our own making', 'GET', '/api/units?cursor=abc', undefined, 400],
    ['SQL for words, which finds nothing', 'GET', `/api/units?q=${encodeURIComponent('\' or 1=1; drop table units; --')}`, undefined, 200],
    ['an address that is none', 'GET', '/api/nothing/here', undefined, 404],
  ]
  it.each(refused)('%s is answered in words', async (_what, method, path, body, status) => {
    const answer = await call(method, path, { role: 'owner', body })
    expect(answer.status).toBe(status)
    expect(answer.text).not.toMatch(/select |insert into|node_modules|\bat .+:\d+:\d+/i)
    if (status < 400) return
    expect(answer.type).toContain('application/problem+json')
    expect(JSON.parse(answer.text)).toMatchObject({ status, code: expect.stringMatching(/^[a-z-]+$/), detail: expect.stringMatching(/\S{2,} \S{2,}/) })
  })

  it('says that one character is off rather than "not found"', async () => {
    const answer = await call('GET', '/api/units/U0000017', { role: 'reader' })
    expect(JSON.parse(answer.text)).toMatchObject({ detail: expect.stringContaining('One character is off') })
  })

  it('takes a form only as JSON', async () => {
    expect((await call('POST', '/api/units', { role: 'owner', body: 'serial=1', type: 'application/x-www-form-urlencoded' })).status).toBe(415)
  })
})

describe('a write sent twice with one key', () => {
  it('happens once, and both senders get the one answer', async () => {
    const body = JSON.stringify({ kind: 'room', name: 'Loft', parentTag: null, note: '' })
    const send = () => fetch(`${server().url}/api/locations`, { method: 'POST', body, headers: { 'authorization': `Bearer ${tokens.get('owner')}`, 'content-type': 'application/json', 'idempotency-key': 'one-and-the-same-key' } })
    const answers = await Promise.all([send(), send(), send()])
    const made = new Set(await Promise.all(answers.map(async answer => (await answer.json()).tag)))
    expect(answers.map(answer => answer.status)).toEqual([201, 201, 201])
    expect(made.size).toBe(1)
  })
})
