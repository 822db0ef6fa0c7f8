import { parentPort } from 'node:worker_threads'
import { type TableFormat, tableLines } from '@/diagrams/fault-table/table-lines'
import type { Circuit } from '@/diagrams/document/circuit-schema'

export type TableAsk = { do: 'open'; circuit: Circuit; format: TableFormat } | { do: 'more' }
export type TableReply = { text: string; done: boolean }

/** Enough to be worth a message, little enough to wait for. */
const mostCharacters = 64_000
const mostMilliseconds = 200

/** What the thread runs: one table, written as fast as it is taken and no faster. */
let lines: Generator<string, void, void> | null = null

parentPort?.on('message', (ask: TableAsk) => {
  if (ask.do === 'open') lines = tableLines(ask.circuit, ask.format)
  else parentPort?.postMessage(portion())
})
parentPort?.postMessage('ready')

/** The next lines, at least one. */
function portion(): TableReply {
  const until = Date.now() + mostMilliseconds
  let text = ''
  for (;;) {
    const next = lines?.next()
    if (!next || next.done) return { text, done: true }
    text += next.value
    if (text.length >= mostCharacters || Date.now() >= until) return { text, done: false }
  }
}
