'use client'

import { useMemo, useState } from 'react'
import type { Circuit } from '@/diagrams/document/circuit-schema'
import type { Overlay } from '@/diagrams/drawing/overlay'
import { CircuitSheet } from '../canvas/circuit-sheet'
import type { Picked } from '../canvas/pick-at'
import { ModeSwitch } from '../shell/mode-switch'
import { RunningHead } from '../shell/running-head'
import { Choice } from '../ui/choice'
import { classNames } from '../ui/class-names'
import { Chevron } from '../ui/glyphs'
import { circuitModes } from './circuit-modes'
import { ControlsBand } from './controls-band'
import { HowItWorks } from './how-it-works'
import { PointsTable } from './points-table'
import { shownVolts } from './shown-volts'
import { useOperation } from './use-operation'
import { WiresTable } from './wires-table'

const tabs = [
  { value: 'points', label: 'Points' },
  { value: 'wires', label: 'Wires' },
  { value: 'how', label: 'How it works' },
] as const
type Tab = (typeof tabs)[number]['value']

/** A circuit being operated: turn the controls and every point shows the volts it should have. */
export function OperateScreen({ circuitId, circuit }: { circuitId: string; circuit: Circuit }) {
  const operation = useOperation(circuit)
  const [wire, setWire] = useState<string | null>(null)
  const [tab, setTab] = useState<Tab>('points')
  const { now, condition, act } = operation
  const overlay = useMemo<Overlay>(
    () => ({
      moment: {
        positions: condition.controls,
        unplugged: condition.unplugged,
        ...(now.ok
          ? {
              relays: now.value.relays,
              works: new Map([...now.value.loads].map(([id, load]) => [id, load.works])),
              blown: now.value.blown,
            }
          : {}),
      },
      ...(now.ok ? { volts: shownVolts(circuit, now.value.volts), wireAmps: now.value.wireAmps } : {}),
    }),
    [circuit, condition, now],
  )
  const onPick = (picked: Picked | null) => {
    if (!picked) return setWire(null)
    if ('point' in picked) act({ do: 'tap-point', point: picked.point })
    else if ('wire' in picked) setWire(picked.wire)
    else turnPart(picked.node)
  }
  /** A switch on the sheet can be worked by tapping it. */
  const turnPart = (id: string) => {
    const node = circuit.nodes.find((one) => one.id === id)
    const closed =
      node?.kind === 'switch' ? node.contacts.find((contact) => typeof contact.closed === 'object') : null
    if (!closed || typeof closed.closed !== 'object') return
    const wanted = closed.closed.control
    const control = circuit.controls.find((one) => one.id === wanted)
    if (!control) return
    const at = control.positions.indexOf(operation.positions[control.id] ?? control.rest)
    const position = control.positions[(at + 1) % control.positions.length]
    if (position !== undefined) act({ do: 'turn', control: control.id, position })
  }
  const code = circuit.codes[0]
  const paneClass = (own: Tab) =>
    classNames(
      'min-h-0 border-line laptop:flex laptop:flex-col laptop:border-l',
      tab === own ? 'flex flex-col' : 'hidden',
    )

  return (
    <div className="flex h-dvh flex-col max-tablet:h-auto max-tablet:min-h-dvh max-tablet:pb-64">
      <RunningHead
        circuit={{
          title: circuit.title,
          vehicle: circuit.vehicle,
          code: code ? `${code.code}${code.failureType ? `-${code.failureType}` : ''}` : null,
        }}
        saved="Nothing recorded"
        modes={<ModeSwitch modes={circuitModes(circuitId)} current="operate" />}
      />
      <main id="main" className="flex min-h-0 flex-1 flex-col">
        <div className="min-h-64 flex-1 max-tablet:h-[36dvh] max-tablet:flex-none">
          <CircuitSheet
            circuit={circuit}
            overlay={overlay}
            picked={wire}
            leads={{ red: operation.state.red, black: operation.state.black }}
            onPick={onPick}
            label="Sheet: volts at every point"
            legend={<Legend />}
          />
        </div>
        <ControlsBand
          circuit={circuit}
          operation={operation}
          className="max-tablet:fixed max-tablet:inset-x-0 max-tablet:bottom-0 max-tablet:z-head max-tablet:max-h-[42dvh] max-tablet:overflow-y-auto"
        />
        <div className="z-rule flex min-h-0 flex-col border-t-2 border-ink bg-tray tablet:h-[22rem] laptop:h-64">
          <div className="border-b border-line p-2 laptop:hidden">
            <Choice label="Show" options={tabs} value={tab} onChange={setTab} fill />
          </div>
          <div className="grid min-h-0 flex-1 grid-cols-[minmax(0,1fr)] laptop:grid-cols-[minmax(0,32fr)_minmax(0,34fr)_minmax(0,34fr)]">
            <div className={classNames(paneClass('how'), 'laptop:border-l-0')}>
              <HowItWorks circuit={circuit} operation={operation} />
            </div>
            <div className={paneClass('points')}>
              <PointsTable circuit={circuit} operation={operation} />
            </div>
            <div className={paneClass('wires')}>
              <WiresTable circuit={circuit} operation={operation} picked={wire} onPick={setWire} />
            </div>
          </div>
        </div>
      </main>
    </div>
  )
}

function Legend() {
  return (
    <p className="hidden items-center gap-5 text-dense tablet:flex">
      <span className="flex items-center gap-2">
        <Chevron size={18} /> carrying current
      </span>
      <span className="flex items-center gap-2">
        <span className="figures rounded-full border-control border-ink bg-window px-2.5 text-small font-bold">
          12.1
        </span>
        volts to chassis
      </span>
    </p>
  )
}
