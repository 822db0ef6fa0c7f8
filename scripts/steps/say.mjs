/** Progress lines: what is being done, and how long it took. Written to stderr, so that stdout stays for answers. */
export function say(text) {
  process.stderr.write(`${text}\n`)
}

/**
 * Runs one step and reports it; steps that took no noticeable time stay short.
 * @template T
 * @param {string} title
 * @param {() => T | Promise<T>} work
 * @param {string} [hint] how long it may take
 * @returns {Promise<T>}
 */
export async function step(title, work, hint) {
  const begun = Date.now()
  process.stderr.write(`· ${title}${hint ? ` (${hint})` : ''} …\n`)
  const result = await work()
  process.stderr.write(`  ${title}: done in ${seconds(Date.now() - begun)}\n`)
  return result
}

/** @param {number} milliseconds */
export function seconds(milliseconds) {
  return milliseconds < 60_000
    ? `${(milliseconds / 1000).toFixed(1)} s`
    : `${Math.floor(milliseconds / 60_000)} min ${Math.round((milliseconds % 60_000) / 1000)} s`
}
