// npm test: every check and every test. The last line sums them: "N passed, N failed".
import { existsSync, readFileSync, rmSync } from 'node:fs'
import path from 'node:path'
import { ensureAptPackages } from './steps/apt-packages.mjs'
import { ensureNodeModules } from './steps/node-modules.mjs'
import { dataFolder, ensureDataFolder, projectFolder } from './steps/project-folder.mjs'
import { Refusal } from './steps/refusal.mjs'
import { run, stopRunning } from './steps/run.mjs'
import { say, seconds, step } from './steps/say.mjs'
import { sumResults } from './steps/sum-results.mjs'

const begun = Date.now()
const sum = { passed: 0, failed: 0 }

for (const signal of /** @type {const} */ (['SIGINT', 'SIGTERM', 'SIGHUP'])) process.on(signal, stopEarly)

try {
  ensureDataFolder()
  await ensureAptPackages(['postgresql', 'chromium', 'ngspice'])
  await ensureNodeModules()
  // Only now: the modules below import packages.
  const { checkAll } = await import('./check.mjs')
  const { ensureBuild } = await import('./steps/build.mjs')
  add(await step('Checks', checkAll))
  await ensureBuild()
  await step('Tests', runTests)
} catch (error) {
  say(error instanceof Refusal ? error.message : String(error.stack ?? error))
  add({ passed: 0, failed: 1 })
}
finish()

async function runTests() {
  const results = path.join(dataFolder, 'test-results.json')
  rmSync(results, { force: true })
  const vitest = path.join(projectFolder, 'node_modules', 'vitest', 'vitest.mjs')
  const args = [vitest, 'run', '--reporter=default', '--reporter=json', `--outputFile.json=${results}`]
  // What is set for a development shell must not leak into tests.
  const code = await run(process.execPath, args, {
    cwd: projectFolder,
    env: { ...process.env, NODE_ENV: 'test' },
  })
  if (!existsSync(results)) say('The tests ended without a report.')
  add(sumResults(existsSync(results) ? JSON.parse(readFileSync(results, 'utf8')) : null, code))
}

function add({ passed, failed }) {
  sum.passed += passed
  sum.failed += failed
}

async function stopEarly() {
  await stopRunning()
  say('Stopped before the end.')
  add({ passed: 0, failed: 1 })
  finish()
}

function finish() {
  say(`All in ${seconds(Date.now() - begun)}`)
  process.stdout.write(`${sum.passed} passed, ${sum.failed} failed\n`)
  process.exit(sum.failed > 0 ? 1 : 0)
}
