import { createHash } from 'node:crypto'
import { mkdtemp, rm } from 'node:fs/promises'
import { createServer } from 'node:http'
import type { IncomingMessage, Server } from 'node:http'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { createStorage } from 'unstorage'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { fileDriver, fileStoreOn } from '../../../../server/utils/file-store'

/** Parts of an AWS Signature Version 4 header ("Authenticating requests", Amazon S3 API reference). */
const SIGNATURE = /^AWS4-HMAC-SHA256 Credential=(\w+)\/(\d{8})\/([\w-]+)\/s3\/aws4_request, ?SignedHeaders=([\w;-]+), ?Signature=[0-9a-f]{64}$/

async function bodyOf(request: IncomingMessage): Promise<Buffer> {
  const chunks: Buffer[] = []
  for await (const chunk of request) chunks.push(Buffer.from(chunk))
  return Buffer.concat(chunks)
}

/** Speaks as much S3 as a file store needs, and refuses what is not signed for its bucket. */
function makeBucket() {
  const kept = new Map<string, Buffer>()
  const refused: string[] = []
  const server: Server = createServer(async (request, response) => {
    const [, accessKey, , region, headers] = SIGNATURE.exec(request.headers.authorization ?? '') ?? []
    const sent = await bodyOf(request)
    const announced = request.headers['x-amz-content-sha256']
    const isWhole = announced === 'UNSIGNED-PAYLOAD' || announced === createHash('sha256').update(sent).digest('hex')
    if (accessKey !== 'knurlkey' || region !== 'eu-west-2' || !headers?.includes('host') || !request.headers['x-amz-date'] || !isWhole || !request.url?.startsWith('/pictures/')) {
      refused.push(`${request.method} ${request.url}`)
      response.writeHead(403).end()
      return
    }
    const key = request.url
    if (request.method === 'PUT') {
      kept.set(key, sent)
      response.writeHead(200).end()
    } else if (request.method === 'DELETE') {
      kept.delete(key)
      response.writeHead(204).end()
    } else {
      const bytes = kept.get(key)
      response.writeHead(bytes ? 200 : 404, bytes && { 'content-length': bytes.byteLength }).end(request.method === 'GET' ? bytes : undefined)
    }
  })
  return { server, kept, refused }
}

const folderOnly = { bucket: '', endpoint: '', region: '', accessKeyId: '', secretAccessKey: '' }
const bytes = Buffer.from([0, 255, 128, 10, 13, 0, 200])

describe('the file store', () => {
  const bucket = makeBucket()
  let folder = ''
  let endpoint = ''

  beforeAll(async () => {
    folder = await mkdtemp(join(tmpdir(), 'knurl-store-'))
    await new Promise<void>(resolve => bucket.server.listen(0, '127.0.0.1', resolve))
    const address = bucket.server.address()
    endpoint = `http://127.0.0.1:${typeof address === 'object' ? address?.port : ''}`
  })
  afterAll(async () => {
    bucket.server.close()
    await rm(folder, { recursive: true })
  })

  const stores = {
    'a folder': () => fileStoreOn(createStorage({ driver: fileDriver({ filesDir: folder, s3: folderOnly }) })),
    'a bucket': () => fileStoreOn(createStorage({
      driver: fileDriver({ filesDir: folder, s3: { bucket: 'pictures', endpoint, region: 'eu-west-2', accessKeyId: 'knurlkey', secretAccessKey: 'not a secret' } }),
    })),
  }

  it.each(['a folder', 'a bucket'] as const)('puts, gets and removes bytes unchanged in %s', async (kind) => {
    const store = stores[kind]()
    expect(await store.has('photos/1/320.webp')).toBe(false)
    expect(await store.get('photos/1/320.webp')).toBeNull()
    await store.put('photos/1/320.webp', bytes)
    expect(await store.has('photos/1/320.webp')).toBe(true)
    expect(await store.get('photos/1/320.webp')).toEqual(bytes)
    await store.remove('photos/1/320.webp')
    await store.remove('photos/1/320.webp')
    expect(await store.get('photos/1/320.webp')).toBeNull()
  })

  it('signs every request to the bucket, under the path that the key says', async () => {
    await stores['a bucket']().put('documents/handbook.pdf', bytes)
    expect([...bucket.kept.keys()]).toEqual(['/pictures/documents/handbook.pdf'])
    expect(bucket.refused).toEqual([])
  })

  it('says so when a bucket is half configured', () => {
    expect(() => fileDriver({ filesDir: folder, s3: { ...folderOnly, bucket: 'pictures', endpoint } })).toThrow('region, accessKeyId, secretAccessKey')
  })
})
