import path from 'node:path'
import { adminRole } from './cluster.mjs'
import { postgresBinaries } from './postgres-binaries.mjs'
import { Refusal } from './refusal.mjs'
import { ask } from './run.mjs'

/** Owns the tables and runs the migrations. */
export const ownerRole = 'halfsplit_owner'
/** Serves the application: owns nothing and cannot step round row-level security. */
export const appRole = 'halfsplit_app'

/**
 * @typedef {{ port: number, adminPassword: string }} Access
 */

/**
 * Runs SQL as the cluster's superuser and answers the rows as text.
 * @param {Access} access
 * @param {string} sql
 * @param {string} [database]
 */
export function administer({ port, adminPassword }, sql, database = 'postgres') {
  const done = ask(
    path.join(postgresBinaries(), 'psql'),
    [
      '-X',
      '-q',
      '-A',
      '-t',
      '-v',
      'ON_ERROR_STOP=1',
      '-h',
      '127.0.0.1',
      '-p',
      String(port),
      '-U',
      adminRole,
      '-d',
      database,
    ],
    // On stdin and in the environment: arguments can be read by every user of the machine.
    {
      cwd: '/',
      input: sql,
      env: { PATH: process.env.PATH, PGPASSWORD: adminPassword, PGOPTIONS: '-c client_min_messages=warning' },
    },
  )
  if (done.code !== 0) throw new Refusal(`The database refused its set-up: ${done.stderr}`)
  return done.stdout
}

/**
 * Makes both roles, or brings their passwords and limits back to what the settings say.
 * @param {Access} access
 * @param {{ owner: string, app: string }} passwords
 */
export function ensureRoles(access, passwords) {
  const limits = 'LOGIN NOSUPERUSER NOCREATEDB NOCREATEROLE NOREPLICATION NOBYPASSRLS'
  administer(
    access,
    [ownerRole, appRole]
      .map((role) => {
        const password = quote(role === ownerRole ? passwords.owner : passwords.app)
        return `DO $do$ BEGIN
          IF NOT EXISTS (SELECT FROM pg_roles WHERE rolname = '${role}') THEN CREATE ROLE ${role}; END IF;
        END $do$;
        ALTER ROLE ${role} WITH ${limits} PASSWORD ${password};`
      })
      .join('\n'),
  )
}

/**
 * Makes the database if it is missing. Only the two roles may connect.
 * @param {Access} access
 * @param {string} name
 * @param {{ template?: string }} [options]
 */
export function ensureDatabase(access, name, { template } = {}) {
  if (hasDatabase(access, name)) return
  administer(
    access,
    `CREATE DATABASE ${identifier(name)} OWNER ${ownerRole}${template ? ` TEMPLATE ${identifier(template)}` : ''}`,
  )
  administer(
    access,
    `REVOKE ALL ON DATABASE ${identifier(name)} FROM PUBLIC; GRANT CONNECT ON DATABASE ${identifier(name)} TO ${appRole}`,
  )
}

/**
 * @param {Access} access
 * @param {string} name
 */
export function hasDatabase(access, name) {
  return administer(access, `SELECT 1 FROM pg_database WHERE datname = ${quote(name)}`) === '1'
}

/**
 * @param {Access} access
 * @param {string} name
 */
export function dropDatabase(access, name) {
  administer(access, `DROP DATABASE IF EXISTS ${identifier(name)} WITH (FORCE)`)
}

function quote(text) {
  return `'${text.replaceAll("'", "''")}'`
}

function identifier(text) {
  return `"${text.replaceAll('"', '""')}"`
}
