import { spawn } from 'node:child_process'
import { connect } from 'node:net'
import { setTimeout as wait } from 'node:timers/promises'
import { projectFolder } from './project-folder.mjs'
import { Refusal } from './refusal.mjs'

/**
 * Starts Next on 127.0.0.1 and answers once it accepts connections.
 * @param {'start' | 'dev'} mode
 * @param {number} port
 * @param {Record<string, string>} settings
 * @param {{ ownGroup?: boolean }} [options] whether Ctrl-C passes it by, because the caller stops it in its own order
 */
export async function startWebServer(mode, port, settings, { ownGroup = false } = {}) {
  const env = {
    ...process.env,
    ...settings,
    NODE_ENV: mode === 'start' ? 'production' : 'development',
    NEXT_TELEMETRY_DISABLED: '1',
    // Next reads .env by itself, but lets the environment win: what the web server has no use for stays out of it.
    DATABASE_OWNER_URL: '',
    DEMO_PASSWORD: '',
  }
  const args = ['node_modules/next/dist/bin/next', mode, '-H', '127.0.0.1', '-p', String(port)]
  const stdio = /** @type {const} */ (['ignore', process.stderr, process.stderr])
  const child = spawn(process.execPath, args, { cwd: projectFolder, env, stdio, detached: ownGroup })
  process.once('exit', () => child.kill())
  for (let waitedMs = 0; waitedMs < 60_000; waitedMs += 100) {
    if (child.exitCode !== null) throw new Refusal('The web server did not start; see its message above.')
    if (await accepts(port)) return child
    await wait(100)
  }
  child.kill('SIGKILL')
  throw new Refusal(`The web server did not answer on port ${port} within a minute.`)
}

function accepts(port) {
  return new Promise((resolve) => {
    const socket = connect(port, '127.0.0.1')
    socket.once('connect', () => resolve(true)).once('error', () => resolve(false))
    socket.once('connect', () => socket.destroy())
  })
}
