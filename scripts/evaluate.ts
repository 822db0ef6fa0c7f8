import { createInterface } from 'node:readline'
import { evaluate } from '../diagrams/evaluate'
import { openEvaluationRequest } from '../diagrams/faults/request'

/** One request per line on standard input, one answer per line on standard output, in order. */
const lines = createInterface({ input: process.stdin, crlfDelay: Number.POSITIVE_INFINITY })

for await (const line of lines) {
  const answer = JSON.stringify(answerTo(line))
  // Wait for a slow reader instead of piling answers up.
  if (!process.stdout.write(`${answer}\n`))
    await new Promise((resume) => process.stdout.once('drain', resume))
}

function answerTo(line: string): object {
  // Answered too, so that whoever counts lines finds the answer to each in its place.
  if (line.trim() === '') return { error: { path: '', message: 'empty line: expected a request' } }
  let input: unknown
  try {
    input = JSON.parse(line)
  } catch (error) {
    return {
      error: { path: '', message: `not JSON: ${error instanceof Error ? error.message : String(error)}` },
    }
  }
  try {
    const opened = openEvaluationRequest(input)
    return opened.ok ? evaluate(opened.value) : { error: opened.problems[0] }
  } catch (error) {
    // A bug, to be told from a bad request by its trace; the lines behind it are answered all the same.
    console.error(error)
    return { error: { path: '', message: 'this request could not be evaluated: a fault of the program' } }
  }
}
