// Lays the demo scenario once; prints its people, so that whoever starts the product can sign in as any of them.
import { existsSync } from 'node:fs'
import path from 'node:path'

const seed = path.join(import.meta.dirname, '..', 'db', 'seed', 'seed-demo.ts')
if (!existsSync(seed)) process.exit(0)
