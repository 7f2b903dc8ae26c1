/**
 * A `Content-Disposition` header for a name that a person gave: an ASCII fallback, and the name itself as RFC 6266 and
 * RFC 8187 encode it, so that no quote or line break in it can end the header.
 */
export function contentDisposition(kind: 'inline' | 'attachment', name: string): string {
  const fallback = name.replaceAll(/[^\w.() -]/g, '_')
  const encoded = encodeURIComponent(name.toWellFormed()).replaceAll(/['()*]/g, character => `%${character.charCodeAt(0).toString(16).toUpperCase()}`)
  return `${kind}; filename="${fallback}"; filename*=UTF-8''${encoded}`
}
