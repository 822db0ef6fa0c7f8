import { z } from 'zod'

export const emailSchema = z
  .string({ error: 'email: expected an address' })
  .trim()
  .toLowerCase()
  .max(254, { error: 'email: at most 254 characters' })
  .pipe(z.email({ error: 'email: expected an address such as name@shop.example' }))

const password = z
  .string({ error: 'password: expected text' })
  .min(10, { error: 'password: at least 10 characters' })
  .max(200, { error: 'password: at most 200 characters' })

export const organisationKinds = ['shop', 'school', 'both'] as const

export const signUpSchema = z.strictObject({
  organisation: z
    .string({ error: 'organisation: expected a name' })
    .trim()
    .min(1, { error: 'organisation: give the shop or school a name' })
    .max(120, { error: 'organisation: at most 120 characters' }),
  kind: z.enum(organisationKinds, { error: 'kind: expected shop, school or both' }).default('shop'),
  name: z
    .string({ error: 'name: expected a name' })
    .trim()
    .min(1, { error: 'name: give your name' })
    .max(120, { error: 'name: at most 120 characters' }),
  email: emailSchema,
  password,
})
export type SignUp = z.input<typeof signUpSchema>

export const signInSchema = z.strictObject({
  email: emailSchema,
  // Any length that could have been set is tried, so that a short guess and a wrong one answer alike.
  password: z
    .string({ error: 'password: expected text' })
    .min(1, { error: 'password: type the password' })
    .max(200, { error: 'password: at most 200 characters' }),
})
export type SignIn = z.input<typeof signInSchema>

export const chooseMembershipSchema = z.strictObject({
  organisationId: z.uuid({ error: 'organisationId: expected a UUID' }),
})
export type ChooseMembership = z.input<typeof chooseMembershipSchema>
