import { projectFolder } from './project-folder.mjs'
import { ask } from './run.mjs'
import { Refusal } from './refusal.mjs'

/**
 * PostgreSQL refuses to run as root. As root, its programs run as the `postgres` user that Debian's package makes;
 * otherwise as whoever we are.
 * @returns {{ uid?: number, gid?: number, cwd: string }}
 */
export function postgresUser() {
  if (process.getuid?.() !== 0) return { cwd: '/' }
  const uid = ask('id', ['-u', 'postgres'])
  const gid = ask('id', ['-g', 'postgres'])
  if (uid.code !== 0) throw new Refusal('There is no user "postgres"; install the Debian package postgresql.')
  return { uid: Number(uid.stdout), gid: Number(gid.stdout), cwd: '/' }
}

/** Whether that user may pass through this checkout's folders (a home folder of root is closed to it). */
export function canReachProject() {
  return ask('test', ['-x', projectFolder], postgresUser()).code === 0
}
