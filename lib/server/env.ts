import { z } from 'zod'

const envSchema = z.object({
  /** The application's own role, which owns no table. */
  DATABASE_URL: z.string().min(1),
  NEXTAUTH_SECRET: z.string().min(16),
  NEXTAUTH_URL: z.url().optional(),
})
export type Env = z.infer<typeof envSchema>

let known: Env | undefined

/** The settings of the server, read on first use: a build runs modules without having any. */
export function env(): Env {
  if (known) return known
  const parsed = envSchema.safeParse(process.env)
  if (!parsed.success) {
    const names = parsed.error.issues.map((issue) => `${issue.path.join('.')}: ${issue.message}`)
    throw new Error(`Settings missing or wrong. ${names.join('; ')}`)
  }
  known = parsed.data
  return known
}
