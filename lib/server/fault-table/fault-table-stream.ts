import type { Worker } from 'node:worker_threads'
import type { Circuit } from '@/diagrams/document/circuit-schema'
import type { TableFormat } from '@/diagrams/fault-table/table-lines'
import { nextMessage } from '../evaluator/next-message'
import { sourceThread } from '../evaluator/source-thread'
import { log } from '../log'
import type { TableAsk, TableReply } from './fault-table-thread'

const mostTables = 2
const mostMegabytes = 512
const startMilliseconds = 60_000
/** One portion; the first one waits for the shorts' fuses to be worked out. */
const portionMilliseconds = 120_000
/** A client that takes nothing for this long has gone, whatever its connection says. */
const idleMilliseconds = 60_000

// On globalThis, since a development server loads this module anew with every change.
const store = globalThis as { halfsplitFaultTables?: { running: number } }
const tables = (store.halfsplitFaultTables ??= { running: 0 })

/** How many tables are being written just now. */
export function tablesRunning(): number {
  return tables.running
}

/**
 * A circuit's fault table as bytes, worked out in a thread of its own while they are taken: what nobody reads is not worked
 * out, and the thread ends with the reader. 'busy' when as many tables are being written as may be.
 */
export function faultTableStream(circuit: Circuit, format: TableFormat): ReadableStream<Uint8Array> | 'busy' {
  if (tables.running >= mostTables) return 'busy'
  tables.running++
  const encoder = new TextEncoder()
  let thread: Worker | null = null
  let ended = false
  let idle: NodeJS.Timeout | undefined
  const end = () => {
    if (ended) return
    ended = true
    clearTimeout(idle)
    tables.running--
    void thread?.terminate()
  }
  const open = async (): Promise<Worker> => {
    const opened = (thread = sourceThread('lib/server/fault-table/fault-table-thread.ts', mostMegabytes))
    await nextMessage(opened, startMilliseconds)
    opened.postMessage({ do: 'open', circuit, format } satisfies TableAsk)
    return opened
  }
  const waitForReader = (controller: ReadableStreamDefaultController<Uint8Array>) => {
    clearTimeout(idle)
    idle = setTimeout(() => {
      end()
      controller.error(new Error('nobody takes the fault table'))
    }, idleMilliseconds)
    idle.unref()
  }
  return new ReadableStream<Uint8Array>(
    {
      start: waitForReader,
      async pull(controller) {
        clearTimeout(idle)
        try {
          const writer = thread ?? (await open())
          writer.postMessage({ do: 'more' } satisfies TableAsk)
          const { text, done } = (await nextMessage(writer, portionMilliseconds)) as TableReply
          if (ended) return
          if (text !== '') controller.enqueue(encoder.encode(text))
          if (done) {
            end()
            controller.close()
          } else waitForReader(controller)
        } catch (error) {
          // A reader that left has ended the thread, too.
          if (ended) return
          end()
          log.error(error, 'the fault table broke off')
          controller.error(error)
        }
      },
      cancel: end,
    },
    // Nothing ahead of the reader.
    { highWaterMark: 0 },
  )
}
