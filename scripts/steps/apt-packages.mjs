import { existsSync } from 'node:fs'
import { installedPostgresVersions } from './postgres-binaries.mjs'
import { Refusal } from './refusal.mjs'
import { ask, run } from './run.mjs'
import { step } from './say.mjs'

/** Debian packages and how to tell that each is there. */
const isInstalled = {
  postgresql: () => installedPostgresVersions().length > 0,
  chromium: () => existsSync('/usr/bin/chromium'),
  ngspice: () => existsSync('/usr/bin/ngspice'),
}

/**
 * Installs what is missing when we are root; tells an ordinary user the one command otherwise.
 * @param {(keyof typeof isInstalled)[]} wanted
 */
export async function ensureAptPackages(wanted) {
  const missing = wanted.filter((name) => !isInstalled[name]())
  if (missing.length === 0) return
  if (process.getuid?.() !== 0) {
    throw new Refusal(
      `Missing on this machine: ${missing.join(', ')}. Run this once, then start again: sudo apt-get install -y ${missing.join(' ')}`,
    )
  }
  if (ask('apt-get', ['--version']).code !== 0) {
    throw new Refusal(
      `Missing on this machine: ${missing.join(', ')}; without apt-get they have to be installed by hand.`,
    )
  }
  await step(`Installing Debian packages: ${missing.join(' ')}`, async () => {
    if ((await install(missing)) === 0) return
    // A bare machine has no package lists yet, and an old one has lists of packages that have moved on.
    await apt(['update', '-q'])
    if ((await install(missing)) !== 0)
      throw new Refusal(`apt-get could not install ${missing.join(' ')}; see its message above.`)
  })
  const absent = missing.filter((name) => !isInstalled[name]())
  if (absent.length > 0)
    throw new Refusal(`Installed, but not found where Debian puts it: ${absent.join(', ')}.`)
}

const install = (names) => apt(['install', '-y', '-q', '--no-install-recommends', ...names])

function apt(args) {
  const env = { ...process.env, DEBIAN_FRONTEND: 'noninteractive' }
  return run('apt-get', args, { env, stdio: ['ignore', process.stderr, process.stderr] })
}
