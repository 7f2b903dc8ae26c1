import { createServer } from 'node:http'
import { env } from 'node:process'
import { createApp, createRouter, defineEventHandler, getQuery, readBody, toNodeListener } from 'h3'
import PDFDocument from 'pdfkit'
import pg from 'pg'
import { create as createQr } from 'qrcode'
import { createSSRApp, h } from 'vue'
import { renderToString } from 'vue/server-renderer'

/** The baselines: each route does what the application's must at least do, and nothing else. */

interface Statement { text: string, values: (string | null)[] }

// The trace turns just-in-time compiling off for its statement, which it slows; its bare copy is to have the same.
const pool = new pg.Pool({ connectionString: env.NUXT_DATABASE_URL, max: 10, options: '-c jit=off' })
const recorded = new Map<string, Statement[]>()

/** Draws QR codes of 30 mm, three to a row, as rectangles: one for each dark module. */
function drawLabels(tags: string[]): Promise<Buffer> {
  const document = new PDFDocument({ size: 'A4', margin: 0 })
  const parts: Buffer[] = []
  document.on('data', (part: Buffer) => parts.push(part))
  const done = new Promise<Buffer>(resolve => document.on('end', () => resolve(Buffer.concat(parts))))
  for (const [place, tag] of tags.entries()) {
    const { modules } = createQr(`http://127.0.0.1:3000/s/${tag}`, { errorCorrectionLevel: 'M' })
    const side = 85 / modules.size
    for (let row = 0; row < modules.size; row++) {
      for (let column = 0; column < modules.size; column++) {
        if (modules.get(row, column)) document.rect(20 + place % 3 * 190 + column * side, 20 + Math.floor(place / 3) * 98 + row * side, side, side)
      }
    }
    document.fill('#000')
  }
  document.end()
  return done
}

const router = createRouter()
  .post('/sql', defineEventHandler(async (event) => {
    const { name, statements } = await readBody<{ name: string, statements: Statement[] }>(event)
    recorded.set(name, statements)
    return { kept: statements.length }
  }))
  .get('/sql', defineEventHandler(async (event) => {
    const results = []
    for (const { text, values } of recorded.get(String(getQuery(event).name)) ?? []) {
      results.push((await pool.query(text, values)).rows)
    }
    return results
  }))
  .get('/labels', defineEventHandler(event => drawLabels(String(getQuery(event).tags).split(','))))
  .get('/page', defineEventHandler(async () => {
    const body = await renderToString(createSSRApp({ render: () => h('main', h('h1', 'Stock')) }))
    return `<!doctype html><html lang="en-GB"><head><title>Stock</title></head><body><div id="app">${body}</div></body></html>`
  }))

createServer(toNodeListener(createApp().use(router))).listen(Number(env.PORT), '127.0.0.1')
