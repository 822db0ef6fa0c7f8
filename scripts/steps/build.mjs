import { createHash } from 'node:crypto'
import { existsSync, readdirSync, readFileSync, writeFileSync } from 'node:fs'
import path from 'node:path'
import { withLock } from './lock.mjs'
import { dataFolder, ensureDataFolder, projectFolder } from './project-folder.mjs'
import { Refusal } from './refusal.mjs'
import { run } from './run.mjs'
import { step } from './say.mjs'

const folders = ['app', 'components', 'db', 'diagrams', 'lib', 'public']
const files = [
  'next.config.mjs',
  'package-lock.json',
  'postcss.config.mjs',
  'proxy.ts',
  'tailwind.config.ts',
  'tsconfig.json',
]
const record = path.join(dataFolder, 'build.json')

/** Makes the production build when what it is made of has changed. */
export async function ensureBuild() {
  ensureDataFolder()
  await withLock(path.join(dataFolder, 'build-lock'), async () => {
    const sources = hashSources()
    if (isCurrent(sources)) return
    await step('Production build', () => build(sources), 'about half a minute')
  })
}

async function build(sources) {
  const env = { ...process.env, NODE_ENV: 'production', NEXT_TELEMETRY_DISABLED: '1' }
  const stdio = /** @type {const} */ (['ignore', process.stderr, process.stderr])
  const code = await run(process.execPath, ['node_modules/next/dist/bin/next', 'build'], {
    cwd: projectFolder,
    env,
    stdio,
  })
  if (code !== 0) throw new Refusal('The production build failed; see its message above.')
  writeFileSync(record, JSON.stringify({ sources, buildId: buildId() }))
}

function isCurrent(sources) {
  if (!existsSync(record)) return false
  const last = JSON.parse(readFileSync(record, 'utf8'))
  return last.sources === sources && last.buildId === buildId()
}

function buildId() {
  const file = path.join(projectFolder, '.next', 'BUILD_ID')
  return existsSync(file) ? readFileSync(file, 'utf8') : null
}

function hashSources() {
  const hash = createHash('sha256')
  const all = folders.flatMap((folder) => filesUnder(path.join(projectFolder, folder)))
  for (const file of [...all, ...files.map((name) => path.join(projectFolder, name))]) {
    if (existsSync(file))
      hash.update(path.relative(projectFolder, file)).update('\0').update(readFileSync(file))
  }
  return hash.digest('hex')
}

function filesUnder(folder) {
  if (!existsSync(folder)) return []
  return readdirSync(folder, { withFileTypes: true, recursive: true })
    .filter((entry) => entry.isFile())
    .map((entry) => path.join(entry.parentPath ?? entry.path, entry.name))
    .sort()
}
