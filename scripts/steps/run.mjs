import { spawn, spawnSync } from 'node:child_process'

/**
 * Runs a program to its end with its output shown; answers its exit code (a signal counts as 1).
 * @param {string} command
 * @param {string[]} args
 * @param {import('node:child_process').SpawnOptions} [options]
 * @returns {Promise<number>}
 */
export function run(command, args, options = {}) {
  return new Promise((resolve, reject) => {
    const child = spawn(command, args, { stdio: ['ignore', 'inherit', 'inherit'], ...options })
    child.once('error', reject)
    child.once('close', (code) => resolve(code ?? 1))
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
