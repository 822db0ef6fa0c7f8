// What `start` and `dev` share: bring everything up, serve, and take it down again in the opposite order.
import { ensureAptPackages } from './apt-packages.mjs'
import { ensureBuild } from './build.mjs'
import { bringUpDatabase, runTypeScript } from './database.mjs'
import { ensureNodeModules } from './node-modules.mjs'
import { isPortFree } from './port.mjs'
import { ensureDataFolder } from './project-folder.mjs'
import { Refusal } from './refusal.mjs'
import { stopChild, stopRunning } from './run.mjs'
import { say, seconds, step } from './say.mjs'
import { ensureSettingsFile, readSettings } from './settings.mjs'
import { startWebServer } from './web-server.mjs'

/** @type {(() => Promise<unknown>)[]} */
const undo = []
let leaving = false

/** @param {'start' | 'dev'} mode */
export async function serve(mode) {
  for (const signal of /** @type {const} */ (['SIGINT', 'SIGTERM', 'SIGHUP']))
    process.on(signal, () => leave(0, 'Stopping …'))
  try {
    await bringUp(mode, Date.now())
  } catch (error) {
    if (leaving) return
    await leave(1, error instanceof Refusal ? error.message : String(error.stack ?? error))
  }
}

async function bringUp(mode, begun) {
  ensureDataFolder()
  if (ensureSettingsFile()) say('· Settings: wrote .env with secrets of this install’s own')
  const { ports, ...settings } = readSettings()
  if (!(await isPortFree(ports.web))) {
    throw new Refusal(`Port ${ports.web} is in use by another program; set PORT in .env to a free one.`)
  }
  await ensureAptPackages(['postgresql'])
  await ensureNodeModules()
  await step(`Database on 127.0.0.1:${ports.database}`, async () => {
    undo.push(await bringUpDatabase({ ...settings, ports }))
  })
  await step('Migrations', () => mustSucceed('migrate.ts', settings, 'The migrations failed'))
  const people = await step('Demo scenario', () =>
    mustSucceed('seed.ts', settings, 'The demo scenario could not be laid'),
  )
  if (mode === 'start') await ensureBuild()
  const child = await step('Web server', () => startWebServer(mode, ports.web, settings, { ownGroup: true }))
  undo.push(() => stopChild(child))
  child.once('exit', (code) => leave(1, `The web server ended by itself (code ${code}).`))
  if (leaving) return
  say(
    `\n${people}\n\nHalfsplit is ready after ${seconds(Date.now() - begun)}: ${settings.NEXTAUTH_URL}\nCtrl-C stops it.\n`,
  )
}

async function mustSucceed(script, settings, otherwise) {
  const { code, output } = await runTypeScript(script, settings)
  if (code !== 0) throw new Refusal(`${otherwise}; see the message above.`)
  return output.trim()
}

async function leave(code, words) {
  if (leaving) return
  leaving = true
  say(`\n${words}`)
  await stopRunning()
  for (const step of undo.reverse()) await step()
  if (code === 0) say('Stopped.')
  process.exit(code)
}
