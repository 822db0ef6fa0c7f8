import { createInterface } from 'node:readline'
import { evaluate } from '../diagrams/evaluate'
import { openEvaluationRequest } from '../diagrams/faults/request'

/** One request per line on standard input, one answer per line on standard output, in order. */
const lines = createInterface({ input: process.stdin, crlfDelay: Number.POSITIVE_INFINITY })

for await (const line of lines) {
  if (line.trim() === '') continue
  const answer = JSON.stringify(answerTo(line))
  // Wait for a slow reader instead of piling answers up.
  if (!process.stdout.write(`${answer}\n`))
    await new Promise((resume) => process.stdout.once('drain', resume))
}

function answerTo(line: string): object {
  let input: unknown
  try {
    input = JSON.parse(line)
  } catch (error) {
    return {
      error: { path: '', message: `not JSON: ${error instanceof Error ? error.message : String(error)}` },
    }
  }
  const opened = openEvaluationRequest(input)
  return opened.ok ? evaluate(opened.value) : { error: opened.problems[0] }
}
