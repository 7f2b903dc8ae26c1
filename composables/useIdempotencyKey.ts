/** 128 random bits as letters and digits. `crypto.randomUUID` is missing on plain http, where a shop's phone may be. */
export function newIdempotencyKey(): string {
  return Array.from(crypto.getRandomValues(new Uint8Array(16)), byte => byte.toString(16).padStart(2, '0')).join('')
}
