import { existsSync, readFileSync } from 'node:fs'
import path from 'node:path'
import { projectFolder } from './project-folder.mjs'
import { Refusal } from './refusal.mjs'
import { run } from './run.mjs'
import { step } from './say.mjs'

/** Installs the locked packages when node_modules is missing or differs from the lock. */
export async function ensureNodeModules() {
  if (matchesLock()) return
  await step('Locked packages (npm ci)', install, 'a minute or two')
}

async function install() {
  const args = ['ci', '--include=dev', '--no-audit', '--no-fund', '--loglevel=error']
  const code = await run('npm', args, {
    cwd: projectFolder,
    stdio: ['ignore', process.stderr, process.stderr],
  })
  if (code !== 0) throw new Refusal('npm ci failed; see its message above. It needs the network once.')
}

/** npm leaves a lock of what it really installed; packages for other machines may be absent from it. */
function matchesLock() {
  const installedLock = path.join(projectFolder, 'node_modules', '.package-lock.json')
  if (!existsSync(installedLock)) return false
  const locked = packagesOf(path.join(projectFolder, 'package-lock.json'))
  const installed = packagesOf(installedLock)
  return (
    Object.keys(installed).every((name) => name in locked) &&
    Object.entries(locked).every(([name, entry]) => {
      const found = installed[name]
      return found ? found.version === entry.version : name === '' || entry.optional || entry.devOptional
    })
  )
}

function packagesOf(file) {
  return JSON.parse(readFileSync(file, 'utf8')).packages
}
