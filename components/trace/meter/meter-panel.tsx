'use client'

import { type ReactNode, type RefObject, useId, useMemo, useState } from 'react'
import type { Circuit } from '@/diagrams/document/circuit-schema'
import { pointName } from '@/diagrams/document/points'
import { type MeterKind, meterKinds, takesFigure } from '@/lib/client/meter/meter-state'
import { kindWords } from '@/lib/client/meter/reading-words'
import { mostVolts, typedValue } from '@/lib/client/meter/typed-value'
import { pointPlaces } from '../../canvas/point-place'
import { Button } from '../../ui/button'
import { Choice } from '../../ui/choice'
import { classNames } from '../../ui/class-names'
import { FieldMessage } from '../../ui/field'
import type { MeterWork } from '../use-meter'
import { ConditionChips } from './condition-chips'
import { FigureChoice } from './figure-choice'
import { Keypad } from './keypad'
import { MeasuredRow } from './measured-row'
import { type Listing, MeterLists } from './meter-lists'
import { MeterScale } from './meter-scale'
import { MeterWindow } from './meter-window'
import { moduleInputs } from './module-inputs'

const levels = [
  { value: 'high', label: 'High' },
  { value: 'low', label: 'Low' },
] as const
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
  const figures = takesFigure(state.kind)
  const inputs = moduleInputs(circuit).length > 0
  const kinds = meterKinds
    .filter((kind) => kind !== 'sees' || inputs)
    .map((kind) => ({ value: kind, label: kindWords[kind] }))
  const points = useMemo(
    () => [
      { id: 'chassis', name: 'chassis', about: '0 V' },
      ...pointPlaces(circuit, state.condition.unplugged).map(({ point }) => ({
        id: point,
        name: pointName(circuit, point),
      })),
    ],
    [circuit, state.condition.unplugged],
  )
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
          tight={inputs}
        />
      </div>
      <MeasuredRow circuit={circuit} state={state} act={act} onList={setListing} />
      <div className={classNames(layout === 'tray' ? 'laptop:order-3' : '')}>
        <ConditionChips circuit={circuit} state={state} act={act} points={points} />
      </div>
      {figures && <FigureChoice state={state} act={act} />}
      {figures ? (
        <div className="flex min-h-20 gap-2 tablet:min-h-[6.125rem] laptop:min-h-20">
          <MeterWindow
            state={state}
            onType={(text) => act({ do: 'type', text })}
            onEnter={enter}
            field={field}
            withKeys={layout === 'screen'}
            describedBy={refusal ? messageId : undefined}
            scale={
              state.kind === 'volts' &&
              !state.moved && (
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
          {state.kind === 'sees' ? (
            <Choice
              label="The module sees"
              options={levels}
              value={state.sees}
              onChange={(sees) => act({ do: 'say-sees', sees })}
              size="bay"
              fill
            />
          ) : (
            <Choice
              label="Does it work"
              options={worksChoices}
              value={state.works === null ? null : state.works ? 'yes' : 'no'}
              onChange={(answer) => act({ do: 'say-works', works: answer === 'yes' })}
              size="bay"
              fill
            />
          )}
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
      {figures && (
        <div className={classNames('flex flex-1', layout === 'tray' && 'max-tablet:hidden laptop:hidden')}>
          <Keypad onPress={(key) => act({ do: 'press', key })} onEnter={enter} />
        </div>
      )}
      <MeterLists
        circuit={circuit}
        points={points}
        act={act}
        listing={listing}
        onClose={() => setListing(null)}
      />
    </div>
  )
}
