import { argv, env, stderr, stdout } from 'node:process'
import { consola } from 'consola'
import { findPersonByEmail } from '../server/services/people'
import { makeToken } from '../server/services/tokens'
import { openDatabase } from '../server/utils/db'

/** Prints a fresh token of the person with this e-mail, and nothing else on stdout, so that a script can take it as it comes. */
async function main(email: string | undefined): Promise<string> {
  const url = env.NUXT_DATABASE_URL || env.DATABASE_URL
  if (!url) throw new Error('Set NUXT_DATABASE_URL to the database that holds the people.')
  if (!email) throw new Error('Say whose token it is to be: npm run token -- EMAIL')
  const { db, pool } = openDatabase(url)
  try {
    const person = await findPersonByEmail(db, email)
    if (!person) throw new Error(`Nobody who may sign in has the e-mail ${email}.`)
    return (await makeToken(db, person, 'Made on the command line')).token
  } finally {
    await pool.end()
  }
}

consola.options.stdout = stderr
try {
  stdout.write(`${await main(argv[2])}\n`)
} catch (error) {
  stderr.write(`${error instanceof Error ? error.message : 'No token was made.'}\n`)
  process.exitCode = 1
}
