import { createServer } from 'node:http'
import { mkdtempSync, readFileSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import path from 'node:path'
import { chromium } from 'playwright-core'
import { build } from 'vite'
import type { Circuit } from '@/diagrams/document/circuit-schema'
import type { Reading } from '@/diagrams/document/reading-schema'
import { samples } from '@/diagrams/samples/all-samples'
import { harnessOfSize } from '../support/harness-of-size'
import { argument } from './support/arguments'
import { median, quantile } from './support/figures'
import { report, type Row } from './support/report'
import { tenReadings } from './support/ten-readings'

/**
 * The evaluator's own worker in headless Chromium: from posting a question to its answer with the plan,
 * by the page's clock. The circuit is known to the worker, the tenth reading is new.
 */
const times = argument('times', 5)
const largest = argument('largest', 100)
const port = argument('port', 4101)

const folder = mkdtempSync(path.join(tmpdir(), 'worker-'))
const root = process.cwd()
try {
  await build({
    configFile: false,
    root,
    logLevel: 'error',
    resolve: { alias: { '@': root } },
    build: {
      outDir: folder,
      emptyOutDir: false,
      lib: {
        entry: path.join(root, 'lib/client/evaluator/evaluator-worker.ts'),
        formats: ['es'],
        fileName: () => 'worker.js',
      },
    },
  })
  await measure(readFileSync(path.join(folder, 'worker.js'), 'utf8'))
} finally {
  rmSync(folder, { recursive: true, force: true })
}

async function measure(worker: string) {
  const server = createServer((request, response) => {
    const script = request.url === '/worker.js'
    response.writeHead(200, { 'content-type': script ? 'text/javascript' : 'text/html' })
    response.end(script ? worker : '<!doctype html><title>worker</title>')
  })
  await new Promise<void>((resolve) => server.listen(port, '127.0.0.1', resolve))
  const browser = await chromium.launch({
    executablePath: '/usr/bin/chromium',
    args: ['--no-sandbox', '--disable-gpu', '--disable-quic', '--no-first-run'],
  })
  try {
    const page = await browser.newPage()
    await page.goto(`http://127.0.0.1:${port}/`)
    const circuits: Circuit[] = [
      ...samples,
      ...[50, 100, 200].filter((size) => size <= largest).map((size) => harnessOfSize(500, size)),
    ]
    const rows: Row[] = []
    for (const circuit of circuits) {
      const sets = Array.from({ length: times }, (_, i) => tenReadings(circuit, i + 1))
      const { first, tenth } = await page.evaluate(timeQuestions, { circuit, sets })
      rows.push({
        what: `${circuit.title}, ${circuit.nodes.length} nodes`,
        goal: '',
        figure: `${median(tenth).toFixed(0)} ms, at most ${quantile(tenth, 1).toFixed(0)}; a new circuit ${first.toFixed(0)} ms`,
        met: null,
        how: `tenth reading with its plan, ${times} vehicles`,
      })
    }
    report('The worker in headless Chromium', rows)
  } finally {
    await browser.close()
    await new Promise((resolve) => server.close(resolve))
  }
}

/** Runs in the page. */
async function timeQuestions({ circuit, sets }: { circuit: Circuit; sets: Reading[][] }) {
  const worker = new Worker('/worker.js', { type: 'module' })
  let number = 0
  const ask = (readings: Reading[]) =>
    new Promise<number>((resolve, reject) => {
      const mine = ++number
      const began = performance.now()
      worker.onerror = (event) => reject(new Error(event.message))
      worker.onmessage = ({ data }) => {
        if (data.number !== mine || !('ok' in data)) return
        if (data.ok) resolve(performance.now() - began)
        else reject(new Error(data.message))
      }
      const question = { circuit, readings, codes: [], priors: 'trade' }
      worker.postMessage({ number: mine, question })
    })
  const first = await ask([])
  const tenth: number[] = []
  for (const readings of sets) {
    await ask(readings.slice(0, -1))
    tenth.push(await ask(readings))
  }
  worker.terminate()
  return { first, tenth }
}
