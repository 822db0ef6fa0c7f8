'use client'

import { type Figure, figures, type MeterAction, type MeterState } from '@/lib/client/meter/meter-state'
import { Choice } from '../../ui/choice'

const words = { value: 'Still', low: 'Least', high: 'Most' } as const satisfies Record<Figure, string>

/** While the harness is moved a reading has three figures; the one that is pressed is typed into the window. */
export function FigureChoice({ state, act }: { state: MeterState; act: (action: MeterAction) => void }) {
  const { moved } = state
  if (!moved) return null
  const typed = { value: state.text, ...moved }
  return (
    <Choice
      label="Which figure"
      options={figures.map((figure) => ({
        value: figure,
        label: (
          <span>
            {words[figure]} <span className="figures">{typed[figure] || '-'}</span>
          </span>
        ),
        spoken: `${words[figure]}, ${typed[figure] || 'not typed yet'}`,
      }))}
      value={state.figure}
      onChange={(figure: Figure) => act({ do: 'pick-figure', figure })}
      fill
      tight
    />
  )
}
