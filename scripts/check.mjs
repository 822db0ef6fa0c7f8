// npm run check: types, lint, format and import rules, two at a time, each reported as it ends.
import { pathToFileURL } from 'node:url'
import { projectFolder } from './steps/project-folder.mjs'
import { collect } from './steps/run.mjs'
import { say, seconds } from './steps/say.mjs'

const bin = (name) => `node_modules/.bin/${name}`

const checks = [
  {
    title: 'Types',
    commands: [
      [bin('next'), 'typegen'],
      [bin('tsc'), '--noEmit', '-p', '.'],
    ],
  },
  {
    title: 'Lint',
    commands: [[bin('eslint'), '--max-warnings', '0', '.']],
  },
  {
    title: 'Types of diagrams/ without a browser or Node',
    commands: [[bin('tsc'), '-p', 'diagrams', '--noEmit']],
  },
  { title: 'Format', commands: [[bin('biome'), 'format', '.']] },
  { title: 'Import rules', commands: [[process.execPath, 'scripts/check-imports.mjs', '.']] },
]

/**
 * Runs every check and answers how many held.
 * @returns {Promise<{ passed: number, failed: number }>}
 */
export async function checkAll() {
  const waiting = [...checks]
  const outcomes = []
  const worker = async () => {
    for (let check = waiting.shift(); check; check = waiting.shift()) outcomes.push(await checkOne(check))
  }
  say(`· Checking: ${checks.map((check) => check.title.toLowerCase()).join(', ')} …`)
  await Promise.all([worker(), worker()])
  return { passed: outcomes.filter(Boolean).length, failed: outcomes.filter((held) => !held).length }
}

async function checkOne({ title, commands }) {
  const begun = Date.now()
  for (const [command, ...args] of commands) {
    const env = { ...process.env, NEXT_TELEMETRY_DISABLED: '1' }
    const { code, output } = await collect(command, args, {
      cwd: projectFolder,
      env,
      stdio: ['ignore', 'pipe', 'pipe'],
    })
    if (code !== 0) {
      say(`${output.trimEnd()}\n✗ ${title}: failed after ${seconds(Date.now() - begun)}`)
      return false
    }
  }
  say(`  ${title}: holds (${seconds(Date.now() - begun)})`)
  return true
}

if (import.meta.url === pathToFileURL(process.argv[1] ?? '').href) {
  const { failed } = await checkAll()
  if (failed > 0) say(`${failed} of ${checks.length} checks failed.`)
  process.exitCode = failed > 0 ? 1 : 0
}
