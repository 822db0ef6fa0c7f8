import path from 'node:path'
import { pathToFileURL } from 'node:url'
import { Worker } from 'node:worker_threads'

const loadSource = `
  import('tsx/esm/api').then(({ register }) => {
    register()
    return import(require('node:worker_threads').workerData)
  })
`

/** A thread that runs a file of ours from the source, by its path: the bundle of the web server has no part in it. */
export function sourceThread(file: string, mostMegabytes: number): Worker {
  const thread = new Worker(loadSource, {
    eval: true,
    workerData: pathToFileURL(path.join(process.cwd(), file)).href,
    resourceLimits: { maxOldGenerationSizeMb: mostMegabytes },
  })
  thread.unref()
  // Told to whoever waits for its next message; without a listener it would end the whole server.
  thread.on('error', () => {})
  return thread
}
