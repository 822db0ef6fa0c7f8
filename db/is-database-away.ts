const network = new Set(['ECONNREFUSED', 'ECONNRESET', 'ENOTFOUND', 'ETIMEDOUT', 'EPIPE', 'EHOSTUNREACH'])

/** True for an error that says the server cannot be reached or is going down, not that a query was wrong. */
export function isDatabaseAway(error: unknown): boolean {
  if (!(error instanceof Error)) return false
  if (error instanceof AggregateError) return error.errors.some(isDatabaseAway)
  const code = (error as { code?: unknown }).code
  if (typeof code === 'string')
    // 08: connection; 57P: shutdown or crash; 53300: no connection left (PostgreSQL, appendix A).
    return network.has(code) || code.startsWith('08') || code.startsWith('57P') || code === '53300'
  return /Connection terminated|connection error and is not queryable|timeout exceeded when trying to connect|Query read timeout/.test(
    error.message,
  )
}
