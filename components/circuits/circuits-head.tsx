import { RunningHead } from '../shell/running-head'
import { ButtonLink } from '../ui/button'

export function CircuitsHead({ mayCreate }: { mayCreate: boolean }) {
  return (
    <RunningHead
      actions={
        mayCreate && (
          <ButtonLink href="/circuits/import" look="filled">
            Bring in a circuit
          </ButtonLink>
        )
      }
    />
  )
}
