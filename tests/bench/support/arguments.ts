/** A figure from the command line: `--runs 100000` or `--runs=100000`. */
export function argument(name: string, otherwise: number): number {
  const text = textArgument(name)
  if (text === undefined) return otherwise
  const value = Number(text)
  if (!Number.isFinite(value)) throw new Error(`--${name} ${text}: expected a number`)
  return value
}

export function textArgument(name: string): string | undefined {
  const at = process.argv.findIndex((arg) => arg === `--${name}` || arg.startsWith(`--${name}=`))
  if (at < 0) return undefined
  const found = process.argv[at]!
  return found.includes('=') ? found.slice(found.indexOf('=') + 1) : process.argv[at + 1]
}

/** True for `--all` and the like. */
export function flag(name: string): boolean {
  return process.argv.includes(`--${name}`)
}
