/** What the rows measure with. */
export interface BenchContext {
  /** The built application, `http://127.0.0.1:PORT`. */
  app: string
  /** A process of its own with nothing but h3, pg, pdfkit and Vue: the bare baselines. */
  bare: string
  /** Headers of a script that is the owner's, by a personal access token. */
  script: Record<string, string>
  /** Headers of the owner's browser, by a session. */
  browser: Record<string, string>
  /** Compact tags of units of the demo shop, at least 24. */
  tags: string[]
  /** What is to be done when everything is measured: a browser to be closed. */
  onStop: (work: () => Promise<void>) => void
  /** Hands the bare process the SQL that the application sends to the database while `work` runs. */
  replaySql: (name: string, work: () => Promise<void>) => Promise<void>
}

/** One line of the table: the application's time beside that of the bare thing, measured in turn. */
export interface BenchRow {
  name: string
  /** What the baseline is, in a few words. */
  against: string
  subject: () => Promise<void>
  baseline: () => Promise<void>
}

export type BenchRows = (context: BenchContext) => Promise<BenchRow[]>

/** Fetches an address to its last byte; anything but 200 is an error. */
export async function get(url: string, headers: Record<string, string> = {}): Promise<void> {
  const response = await fetch(url, { headers, redirect: 'manual' })
  const body = await response.arrayBuffer()
  if (response.status !== 200) {
    throw new Error(`${new URL(url).pathname} answered ${response.status}: ${Buffer.from(body).toString().slice(0, 300)}`)
  }
}

/** Sends JSON and gives the answer; anything but a success is an error. */
export async function send<Answer>(method: 'GET' | 'POST' | 'PATCH', url: string, headers: Record<string, string>, body?: unknown): Promise<Answer> {
  const response = await fetch(url, { method, headers: { ...headers, 'content-type': 'application/json' }, ...body === undefined ? {} : { body: JSON.stringify(body) } })
  if (!response.ok) throw new Error(`${method} ${new URL(url).pathname} answered ${response.status}: ${(await response.text()).slice(0, 300)}`)
  return response.json()
}
