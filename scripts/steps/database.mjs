import path from 'node:path'
import { describeCluster, holdCluster, releaseCluster } from './cluster.mjs'
import { projectFolder } from './project-folder.mjs'
import { Refusal } from './refusal.mjs'
import { appRole, ensureDatabase, ensureRoles, ownerRole } from './roles.mjs'
import { collect } from './run.mjs'

/**
 * Brings up the server that the settings describe, with both roles and an up-to-date database in it.
 * @param {ReturnType<typeof import('./settings.mjs').readSettings>} settings
 * @returns {Promise<() => Promise<boolean>>} lets go of the server again
 */
export async function bringUpDatabase(settings) {
  const app = account(settings, 'DATABASE_URL', appRole)
  const owner = account(settings, 'DATABASE_OWNER_URL', ownerRole)
  if (app.name !== owner.name) {
    throw new Refusal(
      `DATABASE_URL names the database "${app.name}", DATABASE_OWNER_URL "${owner.name}"; expected the same.`,
    )
  }
  const cluster = describeCluster('postgres')
  const access = await holdCluster(cluster, { port: settings.ports.database })
  const letGo = () => releaseCluster(cluster)
  try {
    ensureRoles(access, { owner: owner.password, app: app.password })
    ensureDatabase(access, app.name)
  } catch (error) {
    await letGo()
    throw error
  }
  return letGo
}

/**
 * Runs one of the TypeScript programs beside this folder and answers what it printed; its messages are shown.
 * @param {string} script
 * @param {Record<string, string | undefined>} env
 */
export async function runTypeScript(script, env) {
  const args = ['--import', 'tsx', path.join(projectFolder, 'scripts', script)]
  return collect(process.execPath, args, {
    cwd: projectFolder,
    env: { ...process.env, ...env },
    stdio: ['ignore', 'pipe', 'inherit'],
  })
}

function account(settings, setting, role) {
  const url = new URL(settings[setting])
  if (url.username !== role) throw new Refusal(`${setting} signs in as "${url.username}"; expected ${role}.`)
  return { password: decodeURIComponent(url.password), name: decodeURIComponent(url.pathname.slice(1)) }
}
