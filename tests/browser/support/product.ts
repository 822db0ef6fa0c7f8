import { randomBytes } from 'node:crypto'
import { ensureBuild } from '../../../scripts/steps/build.mjs'
import { runTypeScript } from '../../../scripts/steps/database.mjs'
import { findFreePort } from '../../../scripts/steps/port.mjs'
import { stopChild } from '../../../scripts/steps/run.mjs'
import { startWebServer } from '../../../scripts/steps/web-server.mjs'
import { createTestDatabase } from '../../support/test-cluster'

export type Product = {
  url: string
  /** The password of every person of the demo scenario. */
  password: string
  ownerUrl: string
  appUrl: string
  stop: () => Promise<void>
}

/** The production server on a database of its own that holds the demo scenario. */
export async function startProduct(): Promise<Product> {
  await ensureBuild()
  const database = await createTestDatabase()
  const port = await findFreePort(database.name)
  const url = `http://127.0.0.1:${port}`
  const password = `demo-${randomBytes(6).toString('hex')}`
  const settings = {
    DATABASE_URL: database.appUrl,
    NEXTAUTH_SECRET: randomBytes(24).toString('hex'),
    NEXTAUTH_URL: url,
  }
  const seeded = await runTypeScript('seed.ts', {
    ...settings,
    DATABASE_OWNER_URL: database.ownerUrl,
    DEMO_PASSWORD: password,
    NODE_ENV: undefined,
  })
  if (seeded.code !== 0) throw new Error('The demo scenario could not be laid; see above.')
  const server = await startWebServer('start', port, settings)
  const stop = async () => {
    await stopChild(server)
    await database.drop()
  }
  return { url, password, ownerUrl: database.ownerUrl, appUrl: database.appUrl, stop }
}
