import { spawn, spawnSync } from 'node:child_process'

/** @type {Set<import('node:child_process').ChildProcess>} */
const running = new Set()

/**
 * Runs a program to its end with its output shown; answers its exit code (a signal counts as 1).
 * @param {string} command
 * @param {string[]} args
 * @param {import('node:child_process').SpawnOptions} [options]
 * @returns {Promise<number>}
 */
export async function run(command, args, options = {}) {
  return (await collect(command, args, { stdio: ['ignore', 'inherit', 'inherit'], ...options })).code
}

/**
 * The same, and answers as well what went into those streams that `stdio` names 'pipe'.
 * @param {string} command
 * @param {string[]} args
 * @param {import('node:child_process').SpawnOptions} options
 * @returns {Promise<{ code: number, output: string }>}
 */
export function collect(command, args, options) {
  return new Promise((resolve, reject) => {
    const child = spawn(command, args, options)
    running.add(child)
    let output = ''
    for (const stream of [child.stdout, child.stderr]) {
      stream?.setEncoding('utf8').on('data', (/** @type {string} */ text) => {
        output += text
      })
    }
    child.once('error', reject)
    child.once('close', (code) => {
      running.delete(child)
      resolve({ code: code ?? 1, output })
    })
  })
}

/**
 * Asks every program that still runs to stop, and waits until it has; one that does not within 5 s is ended.
 * @returns {Promise<unknown>}
 */
export function stopRunning() {
  return Promise.all([...running].map((child) => stopChild(child)))
}

/** @param {import('node:child_process').ChildProcess} child */
export function stopChild(child) {
  return new Promise((resolve) => {
    if (child.exitCode !== null || child.signalCode !== null) return resolve(undefined)
    const impatience = setTimeout(() => child.kill('SIGKILL'), 5000)
    child.once('exit', () => {
      clearTimeout(impatience)
      resolve(undefined)
    })
    child.kill('SIGTERM')
  })
}

/**
 * Runs a short program quietly and answers what it printed.
 * @param {string} command
 * @param {string[]} args
 * @param {import('node:child_process').SpawnSyncOptions} [options]
 * @returns {{ code: number, stdout: string, stderr: string }}
 */
export function ask(command, args, options = {}) {
  const done = spawnSync(command, args, { ...options, encoding: 'utf8' })
  return {
    code: done.error ? 127 : (done.status ?? 1),
    stdout: String(done.stdout ?? '').trim(),
    stderr: done.error ? done.error.message : String(done.stderr ?? '').trim(),
  }
}
