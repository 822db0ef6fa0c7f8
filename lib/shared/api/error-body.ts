import { z } from 'zod'
import { errorCodes } from '../errors'

/** The body of every answer that is not 2xx. */
export const errorBodySchema = z.object({
  error: z.object({
    code: z.enum(errorCodes),
    message: z.string(),
    path: z.string().optional(),
    details: z.array(z.string()).optional(),
  }),
})
export type ErrorBody = z.infer<typeof errorBodySchema>
