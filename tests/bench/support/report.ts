import { appendFileSync } from 'node:fs'
import { textArgument } from './arguments'

/** One goal with the figure that was measured. */
export interface Row {
  what: string
  goal: string
  figure: string
  /** Null where there is no goal, only a figure. */
  met: boolean | null
  /** How the figure was come by: counts, seeds. */
  how?: string
}

/**
 * Prints goal beside figure and names what falls short. With `--rows <file>` the rows are appended
 * to that file as well, one JSON a line, for the table of the whole run.
 */
export function report(title: string, rows: readonly Row[]): void {
  const widths = [0, 0, 0]
  for (const row of rows)
    [row.what, row.goal, row.figure].forEach((cell, i) => {
      widths[i] = Math.max(widths[i]!, cell.length)
    })
  console.log(`\n${title}`)
  for (const row of rows) {
    const cells = [row.what, row.goal, row.figure].map((cell, i) => cell.padEnd(widths[i]!))
    console.log(`  ${markOf(row)} ${cells.join('  ')}${row.how ? `  (${row.how})` : ''}`)
  }
  const short = rows.filter((row) => row.met === false)
  console.log(
    short.length === 0
      ? '  Nothing falls short.'
      : `  Falls short: ${short.map((row) => `${row.what} (${row.figure}, goal ${row.goal})`).join('; ')}.`,
  )
  const file = textArgument('rows')
  if (file !== undefined)
    appendFileSync(file, rows.map((row) => `${JSON.stringify({ title, ...row })}\n`).join(''))
}

function markOf({ met }: Row): string {
  return met === null ? '·' : met ? '✓' : '✗'
}
