import type { Problem } from '@/diagrams/document/check-circuit'
import type { Circuit } from '@/diagrams/document/circuit-schema'
import { openCircuit } from '@/diagrams/document/open-circuit'

export type ReadDocument =
  | { ok: true; circuit: Circuit; document: unknown }
  | { ok: false; problems: Problem[] }

/** What the server takes at most; told here before anything is sent. */
export const mostBytes = 2 * 1024 * 1024

/** Text of a file or of the field to a circuit, or every problem with its path. */
export function readDocument(text: string): ReadDocument {
  const bytes = new TextEncoder().encode(text).length
  if (bytes > mostBytes)
    return refuse(`The document has ${(bytes / 1024 / 1024).toFixed(1)} MB, expected at most 2 MB.`)
  let document: unknown
  try {
    document = JSON.parse(text)
  } catch (error) {
    return refuse(`This is not JSON. ${whereOf(error, text)}`)
  }
  const opened = openCircuit(document)
  return opened.ok ? { ok: true, circuit: opened.value, document } : { ok: false, problems: opened.problems }
}

function refuse(message: string): ReadDocument {
  return { ok: false, problems: [{ path: '', message }] }
}

/** Engines word the place differently; where one gives a position, a line is of more use. */
function whereOf(error: unknown, text: string): string {
  const message = error instanceof Error ? error.message : ''
  const position = /position (\d+)/.exec(message)?.[1]
  if (position === undefined) return 'It may have been cut off.'
  const before = text.slice(0, Number(position)).split('\n')
  return `It breaks off at line ${before.length}, character ${(before.at(-1)?.length ?? 0) + 1}.`
}
