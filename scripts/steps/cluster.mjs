// A PostgreSQL server of the project's own: made, started, asked and stopped with Debian's programs.
import { createHash, randomBytes } from 'node:crypto'
import {
  chmodSync,
  chownSync,
  existsSync,
  mkdirSync,
  readFileSync,
  rmSync,
  statSync,
  writeFileSync,
} from 'node:fs'
import path from 'node:path'
import { setTimeout as wait } from 'node:timers/promises'
import { returnLease, takeLease } from './lease.mjs'
import { withLock } from './lock.mjs'
import { findFreePort, isPortFree } from './port.mjs'
import { postgresBinaries } from './postgres-binaries.mjs'
import { canReachProject, postgresUser } from './postgres-user.mjs'
import { dataFolder, ensureDataFolder, installId, projectFolder } from './project-folder.mjs'
import { Refusal } from './refusal.mjs'
import { ask } from './run.mjs'

/** The cluster's own superuser: makes roles and databases, never serves the application. */
export const adminRole = 'halfsplit_admin'

/**
 * @typedef {object} Cluster
 * @property {string} home       folder of everything below
 * @property {string} data       PostgreSQL's data folder
 * @property {string} leases     who uses it
 * @property {string} lock
 * @property {boolean} careless  may lose data in a power cut (tests), in exchange for speed
 */

/**
 * @param {string} name
 * @param {{ careless?: boolean }} [options]
 * @returns {Cluster}
 */
export function describeCluster(name, { careless = false } = {}) {
  ensureDataFolder()
  const home =
    process.getuid?.() === 0 && !canReachProject() ? outsideHome(name) : path.join(dataFolder, name)
  return {
    home,
    data: path.join(home, 'data'),
    leases: path.join(dataFolder, `${name}-leases`),
    lock: path.join(dataFolder, `${name}-lock`),
    careless,
  }
}

function outsideHome(name) {
  const mark = createHash('sha256').update(`${projectFolder} ${installId()}`).digest('hex').slice(0, 8)
  return path.join('/var/lib/halfsplit', `${path.basename(projectFolder)}-${mark}`, name)
}

/**
 * Brings the server up if it is not, and counts `pid` among those who use it.
 * @param {Cluster} cluster
 * @param {{ port?: number, pid?: number }} [options] without a port, any free one
 * @returns {Promise<{ port: number, adminPassword: string }>}
 */
export function holdCluster(cluster, { port, pid = process.pid } = {}) {
  return withLock(cluster.lock, async () => {
    if (!existsSync(path.join(cluster.data, 'PG_VERSION'))) createCluster(cluster)
    const running = await runningPort(cluster)
    if (running !== null && port !== undefined && running !== port) {
      throw new Refusal(
        `The database already runs on port ${running}; DATABASE_PORT asks for ${port}. Stop the other one first.`,
      )
    }
    const chosen = running ?? port ?? (await findFreePort(cluster.home))
    if (running === null) await startCluster(cluster, chosen)
    takeLease(cluster.leases, pid)
    return { port: chosen, adminPassword: readFileSync(path.join(cluster.home, 'admin-password'), 'utf8') }
  })
}

/**
 * Stops the server unless somebody else still uses it; answers whether it stopped.
 * @param {Cluster} cluster
 * @param {number} [pid]
 */
export function releaseCluster(cluster, pid = process.pid) {
  return withLock(cluster.lock, () => {
    if (!returnLease(cluster.leases, pid) || !existsSync(path.join(cluster.data, 'postmaster.pid')))
      return false
    return (
      ask(programs(cluster, 'pg_ctl'), ['-D', cluster.data, '-m', 'fast', '-w', 'stop'], postgresUser())
        .code === 0
    )
  })
}

/** @param {Cluster} cluster */
function createCluster(cluster) {
  const user = postgresUser()
  const passwordFile = path.join(cluster.home, 'admin-password')
  // What an interrupted first run left behind is no cluster.
  rmSync(cluster.data, { recursive: true, force: true })
  mkdirSync(cluster.home, { recursive: true })
  writeFileSync(passwordFile, randomBytes(24).toString('hex'), { mode: 0o600 })
  writeFileSync(path.join(cluster.home, 'belongs-to'), `${projectFolder}\n`)
  if (user.uid !== undefined && user.gid !== undefined) {
    for (const entry of [cluster.home, passwordFile]) chownSync(entry, user.uid, user.gid)
  }
  chmodSync(cluster.home, 0o700)
  const args = ['-D', cluster.data, '-U', adminRole, '--pwfile', passwordFile, '-A', 'scram-sha-256']
  const made = ask(
    path.join(postgresBinaries(), 'initdb'),
    [...args, '-E', 'UTF8', '--locale', 'C.UTF-8', ...(cluster.careless ? ['--no-sync'] : [])],
    user,
  )
  if (made.code !== 0) {
    rmSync(cluster.data, { recursive: true, force: true })
    throw new Refusal(`PostgreSQL could not make its data folder ${cluster.data}: ${lastLine(made.stderr)}`)
  }
}

/**
 * @param {Cluster} cluster
 * @param {number} port
 */
async function startCluster(cluster, port) {
  refuseForeignData(cluster)
  if (!(await isPortFree(port))) {
    throw new Refusal(
      `Port ${port} for the database is in use by another program; set DATABASE_PORT in .env to a free one below 32768.`,
    )
  }
  const settings = [
    'listen_addresses=127.0.0.1',
    `port=${port}`,
    'unix_socket_directories=',
    'max_connections=60',
  ]
  if (cluster.careless) settings.push('fsync=off', 'synchronous_commit=off', 'full_page_writes=off')
  const log = path.join(cluster.home, 'log')
  const options = settings
    .map((setting) => `-c ${setting.endsWith('=') ? `${setting}''` : setting}`)
    .join(' ')
  const started = ask(
    programs(cluster, 'pg_ctl'),
    ['-D', cluster.data, '-l', log, '-w', '-t', '60', '-o', options, 'start'],
    // No pipes: the server would inherit them and keep them open for ever.
    { ...postgresUser(), stdio: 'ignore' },
  )
  if (started.code !== 0 || !(await becomesReady(cluster, port))) {
    const told = existsSync(log) ? lastLine(readFileSync(log, 'utf8')) : 'it wrote no log'
    throw new Refusal(`The database did not start: ${told} (whole log: ${log})`)
  }
}

/** @param {Cluster} cluster */
function refuseForeignData(cluster) {
  const owner = statSync(cluster.data).uid
  const expected = postgresUser().uid ?? process.getuid?.()
  if (owner !== expected) {
    throw new Refusal(
      `The database folder ${cluster.data} belongs to user ${owner}, not ${expected}; start as that user, or move the folder away to begin afresh.`,
    )
  }
}

/**
 * The port of the running server, or null. After a crash `postmaster.pid` remains, and its number may meanwhile belong
 * to another program: then the file is removed, because the server would refuse to start beside it.
 * @param {Cluster} cluster
 */
async function runningPort(cluster) {
  const file = path.join(cluster.data, 'postmaster.pid')
  if (!existsSync(file)) return null
  const [pid, , , port] = readFileSync(file, 'utf8').split('\n')
  if (!isPostgres(pid)) {
    rmSync(file, { force: true })
    return null
  }
  return (await becomesReady(cluster, Number(port))) ? Number(port) : null
}

function isPostgres(pid) {
  try {
    return readFileSync(`/proc/${Number(pid)}/comm`, 'utf8').startsWith('postgres')
  } catch {
    return false
  }
}

async function becomesReady(cluster, port) {
  for (let tried = 0; tried < 100; tried += 1) {
    const up = ask(programs(cluster, 'pg_ctl'), ['-D', cluster.data, 'status'], postgresUser()).code === 0
    if (
      up &&
      ask(programs(cluster, 'pg_isready'), ['-q', '-h', '127.0.0.1', '-p', String(port)], { cwd: '/' })
        .code === 0
    )
      return true
    await wait(100)
  }
  return false
}

function programs(cluster, name) {
  return path.join(postgresBinaries(readFileSync(path.join(cluster.data, 'PG_VERSION'), 'utf8').trim()), name)
}

function lastLine(text) {
  return text.trim().split('\n').at(-1) ?? ''
}
