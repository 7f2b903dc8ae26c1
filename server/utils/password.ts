import { Hash } from '@adonisjs/hash'
import { Scrypt } from '@adonisjs/hash/drivers/scrypt'

/**
 * The library and settings under `hashPassword` of nuxt-auth-utils (scrypt, n = 16384), reached without Nuxt, so that the
 * demo loader and the scripts make the same hashes as the running application.
 */
const hash = new Hash(new Scrypt({}))

/** The same letters typed on two keyboards are the same password (NIST SP 800-63B: normalise before hashing). */
const normal = (password: string) => password.normalize('NFC')

/** A password as it is kept: salted scrypt, in PHC format. */
export async function sealPassword(password: string): Promise<string> {
  return hash.make(normal(password))
}

/** Nobody's password. Checked when an e-mail is unknown, so that the answer takes as long as for one that is known. */
let nobodys: Promise<string> | undefined

/** Whether this is the sealed password; costs the same when there is none. */
export async function passwordMatches(sealed: string | null, password: string): Promise<boolean> {
  nobodys ??= sealPassword('nobody signs in with this one')
  const matches = await hash.verify(sealed ?? await nobodys, normal(password))
  return sealed !== null && matches
}
