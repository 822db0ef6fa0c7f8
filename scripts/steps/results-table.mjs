/** The figures of one whole run as a page: goal beside figure, one table a measurement. */
export function resultsTable(date, given, rows) {
  const titles = [...new Set(rows.map((row) => row.title))]
  const cell = (text) => String(text ?? '').replaceAll('|', '\\|')
  const lines = [
    `# Goals and figures, ${date}`,
    '',
    `Two cores, shared with other work. \`npm run bench${given.length > 0 ? ` -- ${given.join(' ')}` : ''}\``,
  ]
  for (const title of titles) {
    lines.push('', `## ${title}`, '', '| what | goal | figure | met | how |', '|---|---|---|---|---|')
    for (const row of rows.filter((one) => one.title === title)) {
      const met = row.met === null ? '' : row.met ? 'yes' : '**no**'
      lines.push(
        `| ${cell(row.what)} | ${cell(row.goal)} | ${cell(row.figure)} | ${met} | ${cell(row.how)} |`,
      )
    }
  }
  const short = rows.filter((row) => row.met === false)
  lines.push('', '## What falls short', '')
  if (short.length === 0) lines.push('Nothing.')
  for (const row of short) lines.push(`- ${row.title}: ${row.what}: ${row.figure}, goal ${row.goal}`)
  return `${lines.join('\n')}\n`
}
