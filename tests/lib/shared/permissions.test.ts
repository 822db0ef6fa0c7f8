import { describe, expect, it } from 'vitest'
import { type Action, actions, can, type Role, roles } from '@/lib/shared/permissions'

// The product's sentence on roles, written out as a table of its own: owner everything; instructor and technician
// make and edit circuits, connectors and traces; instructors delete any circuit, technicians their own; students
// read circuits and keep their own traces.
const expected: Record<Action, Record<Role, 'any' | 'own' | 'no'>> = {
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
}

describe('the permission table', () => {
  it('knows the actions of the product and no other', () => {
    expect([...actions].sort()).toEqual(Object.keys(expected).sort())
  })

  for (const action of actions)
    for (const role of roles)
      it(`lets ${role} do ${action}: ${expected[action][role]}`, () => {
        expect(can(role, action, { own: true })).toBe(expected[action][role] !== 'no')
        expect(can(role, action, { own: false })).toBe(expected[action][role] === 'any')
        expect(can(role, action)).toBe(expected[action][role] === 'any')
      })
})
