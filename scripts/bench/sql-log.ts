import { open, stat } from 'node:fs/promises'
import { setTimeout as sleep } from 'node:timers/promises'
import pg from 'pg'

export interface Statement { text: string, values: (string | null)[] }

/**
 * Records what a throw-away PostgreSQL is asked while `work` runs, from its own log: so the bare baseline sends what the
 * application really sends, however that changes.
 */
export async function recordSql(adminUrl: string, log: string, work: () => Promise<void>): Promise<Statement[]> {
  const client = new pg.Client({ connectionString: adminUrl })
  await client.connect()
  try {
    await client.query('alter system set log_statement = \'all\'')
    await client.query('select pg_reload_conf()')
    // Sessions take a reload up between statements, once the signal has reached them.
    await sleep(500)
    const { size } = await stat(log)
    await work()
    await sleep(200)
    return parseLog(await readFrom(log, size))
  } finally {
    await client.query('alter system reset log_statement')
    await client.query('select pg_reload_conf()')
    await client.end()
  }
}

async function readFrom(path: string, offset: number): Promise<string> {
  const file = await open(path)
  try {
    const { size } = await file.stat()
    const buffer = Buffer.alloc(size - offset)
    await file.read(buffer, 0, buffer.length, offset)
    return buffer.toString()
  } finally {
    await file.close()
  }
}

/** Reads selects and their parameters from PostgreSQL's log; writes (when a token was last used) are left out. */
function parseLog(text: string): Statement[] {
  const statements: Statement[] = []
  for (const record of text.replaceAll('\n\t', '\n').split(/^(?=\d{4}-\d\d-\d\d .*? (?:LOG|DETAIL|STATEMENT|ERROR|WARNING): )/m)) {
    const statement = /(?:LOG): {2}(?:execute [^:]+|statement): (.*)$/s.exec(record)?.[1]?.trim()
    const parameters = /DETAIL: {2}parameters: (.*)$/s.exec(record)?.[1]
    const last = statements.at(-1)
    if (statement !== undefined) statements.push({ text: statement, values: [] })
    else if (parameters !== undefined && last) last.values = parseParameters(parameters)
  }
  return statements.filter(({ text: sql }) => /^(select|with)\b/i.test(sql))
}

/** `$1 = 'a''b', $2 = NULL` */
function parseParameters(text: string): (string | null)[] {
  return [...text.matchAll(/\$\d+ = (?:'((?:[^']|'')*)'|NULL)/g)].map(match => match[1]?.replaceAll('\'\'', '\'') ?? null)
}
