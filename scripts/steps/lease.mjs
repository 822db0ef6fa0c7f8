import { mkdirSync, readdirSync, rmSync, writeFileSync } from 'node:fs'
import path from 'node:path'
import { isAlive } from './lock.mjs'

/** Leases count who still uses a shared server: one empty file per process, named by its number. */
export function takeLease(folder, pid = process.pid) {
  mkdirSync(folder, { recursive: true })
  writeFileSync(path.join(folder, String(pid)), '')
}

/** Gives the lease back and answers whether nobody else holds one. */
export function returnLease(folder, pid = process.pid) {
  rmSync(path.join(folder, String(pid)), { force: true })
  let others = 0
  for (const name of readdirOrNone(folder)) {
    if (isAlive(Number(name))) others += 1
    else rmSync(path.join(folder, name), { force: true })
  }
  return others === 0
}

function readdirOrNone(folder) {
  try {
    return readdirSync(folder)
  } catch {
    return []
  }
}
