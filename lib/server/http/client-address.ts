/**
 * The network address that attempts to sign in are counted by. The web server puts it in the header when no proxy
 * did; behind a proxy the last entry is the one it added itself. The limit by account does not rest on it.
 */
export function clientAddress(headers: Record<string, unknown> | undefined): string {
  const forwarded = headers?.['x-forwarded-for']
  const text = Array.isArray(forwarded) ? forwarded.join(',') : String(forwarded ?? '')
  return text.split(',').at(-1)?.trim().slice(0, 60) || 'unknown'
}
