'use client'

import { useState } from 'react'
import { Button } from '../ui/button'
import { FieldMessage } from '../ui/field'
import { type ActorView, useChooseOrganisation } from './actor-context'

/** The other shops and schools of this person; nothing for those who belong to one. */
export function OrganisationSwitch({ actor }: { actor: ActorView }) {
  const choose = useChooseOrganisation()
  const [failure, setFailure] = useState<string | null>(null)
  const [going, setGoing] = useState<string | null>(null)
  const others = actor.memberships.filter((entry) => entry.organisationId !== actor.organisation.id)
  if (!choose || others.length === 0) return null
  return (
    <div className="mt-4 border-t border-line pt-3">
      <p className="text-small font-bold text-ink-2">Work in another shop or school</p>
      <ul className="mt-2 flex flex-col gap-2">
        {others.map((entry) => (
          <li key={entry.organisationId}>
            <Button
              className="w-full"
              disabled={going !== null}
              onClick={async () => {
                setGoing(entry.organisationId)
                try {
                  const chosen = await choose({ organisationId: entry.organisationId })
                  // Nothing of the shop just left may stay on the screen or in memory.
                  if (chosen.ok) return location.assign('/circuits')
                  setFailure(chosen.failure.message)
                } catch {
                  setFailure('The server did not answer. Try again when it is back.')
                }
                setGoing(null)
              }}
            >
              {entry.organisation}
            </Button>
          </li>
        ))}
      </ul>
      {failure && <FieldMessage id="organisation-refused">{failure}</FieldMessage>}
    </div>
  )
}
