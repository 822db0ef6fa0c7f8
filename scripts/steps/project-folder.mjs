import { randomBytes } from 'node:crypto'
import { accessSync, constants, existsSync, mkdirSync, readFileSync, writeFileSync } from 'node:fs'
import path from 'node:path'
import { Refusal } from './refusal.mjs'

/** The root of this checkout. */
export const projectFolder = path.resolve(import.meta.dirname, '..', '..')

/** Everything an install makes for itself (database, hashes, locks) lives here and may be deleted to begin afresh. */
export const dataFolder = path.join(projectFolder, '.data')

export function ensureDataFolder() {
  try {
    mkdirSync(dataFolder, { recursive: true })
    accessSync(dataFolder, constants.W_OK)
  } catch (error) {
    throw new Refusal(
      `Cannot write to ${dataFolder} (${error.code}): it belongs to another user. Start as that user, or move it away to begin afresh.`,
    )
  }
}

/** A name of this install's own, so that a new clone at an old path does not find the old clone's data. */
export function installId() {
  ensureDataFolder()
  const file = path.join(dataFolder, 'install-id')
  if (!existsSync(file)) writeFileSync(file, randomBytes(4).toString('hex'), { flag: 'wx' })
  return readFileSync(file, 'utf8').trim()
}
