/**
 * Where to go after signing in: a path of this shop, or the front page. Anything that a browser could read as another
 * site is dropped: `//elsewhere`, `/\elsewhere`, a full address, control characters that browsers strip.
 */
export function safeNext(next: unknown): string {
  if (typeof next !== 'string' || !/^\/(?![/\\])[^\\\p{Cc}]*$/u.test(next)) return '/'
  if (next === '/sign-in' || next.startsWith('/sign-in?') || next.startsWith('/first-run')) return '/'
  return next
}
