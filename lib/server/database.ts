import { connect } from '@/db/connect'
import type { Database } from '@/db/tables/database'
import { env } from './env'

// On globalThis, since a development server loads this module anew with every change.
const store = globalThis as { halfsplitDatabase?: Database }

/** The one pool of this process, opened on first use. */
export function database(): Database {
  store.halfsplitDatabase ??= connect(env().DATABASE_URL)
  return store.halfsplitDatabase
}
