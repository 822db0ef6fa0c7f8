// npm run migrate: the database up to the newest migration, then as before.
import { bringUpDatabase, runTypeScript } from './steps/database.mjs'
import { Refusal } from './steps/refusal.mjs'
import { ensureSettingsFile, readSettings } from './steps/settings.mjs'

try {
  ensureSettingsFile()
  const settings = readSettings()
  const letGo = await bringUpDatabase(settings)
  const { code } = await runTypeScript('migrate.ts', { DATABASE_OWNER_URL: settings.DATABASE_OWNER_URL })
  await letGo()
  process.exitCode = code
} catch (error) {
  if (!(error instanceof Refusal)) throw error
  console.error(error.message)
  process.exitCode = 1
}
