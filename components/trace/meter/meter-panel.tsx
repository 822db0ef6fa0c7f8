'use client'

import { type ReactNode, type RefObject, useId, useState } from 'react'
import type { Circuit } from '@/diagrams/document/circuit-schema'
import { pointName } from '@/diagrams/document/points'
import { siteName } from '@/diagrams/document/sites'
import { type MeterKind, meterKinds, type MeterState } from '@/lib/client/meter/meter-state'
import { kindWords } from '@/lib/client/meter/reading-words'
import { mostVolts, typedValue } from '@/lib/client/meter/typed-value'
import { Button } from '../../ui/button'
import { Choice } from '../../ui/choice'
import { classNames } from '../../ui/class-names'
import { FieldMessage } from '../../ui/field'
import type { MeterWork } from '../use-meter'
import { ConditionChips } from './condition-chips'
import { Keypad } from './keypad'
import { LeadField } from './lead-field'
import { type Listing, MeterLists } from './meter-lists'
import { MeterScale } from './meter-scale'
import { MeterWindow } from './meter-window'
import { PickField } from './pick-field'

const kinds = meterKinds.map((kind) => ({ value: kind, label: kindWords[kind] }))
const worksChoices = [
  { value: 'yes', label: 'Works' },
  { value: 'no', label: 'Does not' },
] as const

/** Entry of a reading: kind, leads, conditions, the figure, and one key that logs it. */
export function MeterPanel({
  circuit,
  meter,
  field,
  layout,
  outcomes: outcomeRows,
}: {
  circuit: Circuit
  meter: MeterWork
  field?: RefObject<HTMLInputElement | null>
  /** Tray: under the sheet, keys only on a tablet. Screen: a phone's whole screen, keys always. */
  layout: 'tray' | 'screen'
  /** Rows of the outcomes, between the window and the keys of a phone. */
  outcomes?: ReactNode
}) {
  const [listing, setListing] = useState<Listing>(null)
  const messageId = useId()
  const { state, act, refusal, enter, outcomes } = meter
  const value = typedValue(state)
  const takesFigure = state.kind !== 'works'
  return (
    <div className="flex min-h-0 w-full min-w-0 flex-1 flex-col gap-2">
      <div className="flex items-center gap-3">
        {layout === 'tray' && <h2 className="hidden text-body font-bold laptop:block">Meter</h2>}
        <Choice
          label="What to measure"
          options={kinds}
          value={state.kind}
          onChange={(kind: MeterKind) => act({ do: 'choose-kind', kind })}
          fill
        />
      </div>
      <div className="flex gap-2">
        {state.kind === 'volts' || state.kind === 'ohms' ? (
          (['red', 'black'] as const).map((lead) => (
            <LeadField
              key={lead}
              lead={lead}
              point={leadWords(circuit, state, lead)}
              active={state.lead === lead}
              onPress={() => {
                act({ do: 'pick-lead', lead })
                setListing(lead)
              }}
            />
          ))
        ) : state.kind === 'amps' ? (
          <PickField
            label="Clamp round"
            value={state.wire === null ? null : siteName(circuit, `wire:${state.wire}`)}
            unset="tap a wire"
            onPress={() => setListing('wire')}
          />
        ) : (
          <PickField
            label="Does its job"
            value={state.node === null ? null : siteName(circuit, `part:${state.node}`)}
            unset="tap a load"
            onPress={() => setListing('node')}
          />
        )}
      </div>
      <div className={classNames(layout === 'tray' ? 'laptop:order-3' : '')}>
        <ConditionChips circuit={circuit} state={state} act={act} />
      </div>
      {takesFigure ? (
        <div className="flex min-h-20 gap-2 tablet:min-h-[6.125rem] laptop:min-h-20">
          <MeterWindow
            state={state}
            onType={(text) => act({ do: 'type', text })}
            onEnter={enter}
            field={field}
            withKeys={layout === 'screen'}
            describedBy={refusal ? messageId : undefined}
            scale={
              state.kind === 'volts' && (
                <MeterScale
                  outcomes={outcomes}
                  most={mostVolts(circuit) * 1.2}
                  value={typeof value === 'number' ? value : null}
                />
              )
            }
          />
          {layout === 'tray' && (
            <Button look="filled" size="bay" onClick={enter} className="w-28 leading-tight max-laptop:hidden">
              Enter reading
            </Button>
          )}
        </div>
      ) : (
        <div className="flex gap-2">
          <Choice
            label="Does it work"
            options={worksChoices}
            value={state.works === null ? null : state.works ? 'yes' : 'no'}
            onChange={(answer) => act({ do: 'say-works', works: answer === 'yes' })}
            size="bay"
            fill
          />
          <Button look="filled" size="bay" onClick={enter} className="w-28 flex-none leading-tight">
            Enter reading
          </Button>
        </div>
      )}
      {refusal && (
        <div
          id={messageId}
          role="alert"
          className="-mt-1 flex items-center gap-x-3 *:flex-none *:first:flex-1 laptop:order-2"
        >
          <FieldMessage id={`${messageId}-text`}>{refusal.message}</FieldMessage>
          {state.kind === 'ohms' && state.condition.battery && (
            <Button look="text" onClick={() => act({ do: 'battery', connected: false })}>
              Battery off
            </Button>
          )}
          {refusal.meant !== null && (
            <Button look="text" onClick={() => act({ do: 'type', text: refusal.meant ?? '' })}>
              Use {refusal.meant}
            </Button>
          )}
        </div>
      )}
      {outcomeRows}
      {takesFigure && (
        <div className={classNames('flex flex-1', layout === 'tray' && 'max-tablet:hidden laptop:hidden')}>
          <Keypad onPress={(key) => act({ do: 'press', key })} onEnter={enter} />
        </div>
      )}
      <MeterLists
        circuit={circuit}
        state={state}
        act={act}
        listing={listing}
        onClose={() => setListing(null)}
      />
    </div>
  )
}

function leadWords(circuit: Circuit, state: MeterState, lead: 'red' | 'black'): string | null {
  const point = lead === 'red' ? state.red : state.black
  return point === null ? null : pointName(circuit, point)
}
