import { parentPort } from 'node:worker_threads'
import { evaluate } from '@/diagrams/evaluate'
import { openEvaluationRequest } from '@/diagrams/faults/request'
import type { Reply } from './evaluate-apart'

/** What the thread runs: one question at a time, opened and answered; the first message says that it is ready. */
parentPort?.on('message', (input: unknown) => {
  const opened = openEvaluationRequest(input)
  const reply: Reply = opened.ok ? { ok: true, value: evaluate(opened.value) } : opened
  parentPort?.postMessage(reply)
})
parentPort?.postMessage('ready')
