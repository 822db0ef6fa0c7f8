import { existsSync, readdirSync } from 'node:fs'
import path from 'node:path'
import { Refusal } from './refusal.mjs'

const debianFolder = '/usr/lib/postgresql'

/** Versions of Debian's PostgreSQL servers on this machine, newest first. */
export function installedPostgresVersions() {
  if (!existsSync(debianFolder)) return []
  return readdirSync(debianFolder)
    .filter((version) => existsSync(path.join(debianFolder, version, 'bin', 'initdb')))
    .sort((a, b) => Number(b) - Number(a))
}

/**
 * The folder of the programs: of the given version (a data folder opens with its own version only) or the newest.
 * @param {string} [version]
 */
export function postgresBinaries(version) {
  const installed = installedPostgresVersions()
  const chosen = version ?? installed[0]
  if (!chosen) throw new Refusal('PostgreSQL is missing: apt-get install -y postgresql')
  if (!installed.includes(chosen)) {
    throw new Refusal(
      `The data was written by PostgreSQL ${chosen}, which is missing: apt-get install -y postgresql-${chosen}`,
    )
  }
  return path.join(debianFolder, chosen, 'bin')
}
