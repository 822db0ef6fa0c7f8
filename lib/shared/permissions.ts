export const roles = ['owner', 'instructor', 'technician', 'student'] as const
export type Role = (typeof roles)[number]

type Grant = 'any' | 'own' | 'no'

/** Who may do what: one row an action, one column a role. Use cases ask it; components only hide buttons by it. */
const table = {
  'circuit.read': { owner: 'any', instructor: 'any', technician: 'any', student: 'any' },
  'circuit.create': { owner: 'any', instructor: 'any', technician: 'any', student: 'no' },
  'circuit.edit': { owner: 'any', instructor: 'any', technician: 'any', student: 'no' },
  'circuit.delete': { owner: 'any', instructor: 'any', technician: 'own', student: 'no' },
  'connector.read': { owner: 'any', instructor: 'any', technician: 'any', student: 'any' },
  'connector.edit': { owner: 'any', instructor: 'any', technician: 'any', student: 'no' },
  'trace.create': { owner: 'any', instructor: 'any', technician: 'any', student: 'any' },
  'trace.read': { owner: 'any', instructor: 'any', technician: 'any', student: 'own' },
  'trace.write': { owner: 'any', instructor: 'any', technician: 'any', student: 'own' },
  evaluate: { owner: 'any', instructor: 'any', technician: 'any', student: 'any' },
} as const satisfies Record<string, Record<Role, Grant>>

export type Action = keyof typeof table
export const actions = Object.keys(table) as Action[]

/** `own`: whether the actor made the thing; leave it out where there is no thing yet. */
export function can(role: Role, action: Action, { own = false }: { own?: boolean } = {}): boolean {
  const grant: Grant = table[action][role]
  return grant === 'any' || (grant === 'own' && own)
}
