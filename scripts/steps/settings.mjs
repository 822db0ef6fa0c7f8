import { randomBytes, randomInt } from 'node:crypto'
import { existsSync, readFileSync, writeFileSync } from 'node:fs'
import path from 'node:path'
import { parseEnv } from 'node:util'
import { projectFolder } from './project-folder.mjs'
import { Refusal } from './refusal.mjs'

const settingsFile = path.join(projectFolder, '.env')
const exampleFile = path.join(projectFolder, '.env.example')
const loopback = new Set(['127.0.0.1', 'localhost', '[::1]'])

/**
 * Makes `.env` from `.env.example` with secrets of this install's own; answers whether it had to. A copy that
 * somebody made by hand is filled in where it still asks: the placeholder itself is no secret.
 */
export function ensureSettingsFile(file = settingsFile) {
  const there = existsSync(file)
  const text = readFileSync(there ? file : exampleFile, 'utf8')
  const filled = fillExample(text)
  if (there && filled === text) return false
  writeFileSync(file, filled, { mode: 0o600, flag: there ? 'w' : 'wx' })
  return true
}

/**
 * The example with a new secret or password wherever it asks for one; its comments stay.
 * @param {string} text
 */
export function fillExample(text) {
  return text
    .replace(/^(?!#)(.*)<secret>/gm, (_, before) => before + randomBytes(24).toString('hex'))
    .replace(/^(?!#)(.*)<password>/gm, (_, before) => before + typeablePassword())
}

/** Twelve letters and digits that are not mistaken for one another when read aloud. */
function typeablePassword() {
  const letters = 'abcdefghjkmnpqrstuvwxyz23456789'
  return Array.from({ length: 12 }, () => letters[randomInt(letters.length)]).join('')
}

/**
 * The settings of this install: `.env`, overruled by the environment, checked for what starting needs.
 * @returns {Record<string, string> & { ports: { web: number, database: number } }}
 */
export function readSettings() {
  const fromFile = existsSync(settingsFile) ? parseEnv(readFileSync(settingsFile, 'utf8')) : {}
  const names = [...readFileSync(exampleFile, 'utf8').matchAll(/^([A-Z_]+)=/gm)].map((match) =>
    String(match[1]),
  )
  const settings = {}
  for (const name of names) {
    const value = process.env[name] ?? fromFile[name]
    if (!value) throw new Refusal(`${name} is not set; add it to .env (see .env.example).`)
    settings[name] = value
  }
  const ports = { web: portOf(settings, 'PORT'), database: portOf(settings, 'DATABASE_PORT') }
  if (ports.database >= 32768 || ports.database === 5432) {
    throw new Refusal(`DATABASE_PORT is ${ports.database}; expected a port below 32768 other than 5432.`)
  }
  settings.NEXTAUTH_URL = withLocalPort(settings.NEXTAUTH_URL, 'NEXTAUTH_URL', ports.web)
  for (const name of ['DATABASE_URL', 'DATABASE_OWNER_URL'])
    settings[name] = withLocalPort(settings[name], name, ports.database)
  return { ...settings, ports }
}

function portOf(settings, name) {
  const port = Number(settings[name])
  if (!Number.isInteger(port) || port < 1024 || port > 65535) {
    throw new Refusal(`${name} is "${settings[name]}"; expected a whole number from 1024 to 65535.`)
  }
  return port
}

/** So that one line moves a port: addresses on this machine follow the port settings. */
function withLocalPort(text, name, port) {
  let url
  try {
    url = new URL(text)
  } catch {
    throw new Refusal(`${name} is not an address: "${text.replace(/:[^:@/]*@/, ':…@')}".`)
  }
  if (!loopback.has(url.hostname)) return text
  url.port = String(port)
  return url.href.replace(/\/$/, '')
}
