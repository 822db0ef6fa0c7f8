'use client'

import 'reactflow/dist/base.css'
import { type MouseEvent, type ReactNode, useEffect, useMemo, useRef } from 'react'
import {
  ConnectionMode,
  ReactFlow,
  ReactFlowProvider,
  useReactFlow,
  useStore,
  ViewportPortal,
} from 'reactflow'
import type { Circuit } from '@/diagrams/document/circuit-schema'
import { pointName } from '@/diagrams/document/points'
import type { Overlay } from '@/diagrams/drawing/overlay'
import { useKeyCommands } from '@/lib/client/keys/use-key-commands'
import { KeyMap } from './key-map'
import { LeadDrawing } from './lead-drawing'
import { MarksDrawing } from './marks-drawing'
import { OutlineNode } from './outline-node'
import { PartNode } from './part-node'
import { type Picked, pickAt } from './pick-at'
import { type PointPlace, pointPlaces } from './point-place'
import { buildScene, type Scene } from './scene'
import { SceneContext } from './scene-context'
import { SheetButtons } from './sheet-buttons'
import { SheetPoints } from './sheet-points'
import { type Fit, leastZoom, mostZoom, useSheetView } from './sheet-view'
import { toFlow } from './to-flow'
import { WireEdge } from './wire-edge'

export interface CircuitSheetProps {
  circuit: Circuit
  overlay: Overlay
  /** The wire that is picked. */
  picked?: string | null
  /** Points the meter's leads are on. */
  leads?: { red: string | null; black: string | null }
  /** What a finger or a key picked; null where nothing was. */
  onPick: (picked: Picked | null) => void
  /** Counts or a key of signs, at the top left. */
  legend?: ReactNode
  /** What the sheet shows when it appears. */
  first?: Fit
  /** Changes when the sheet ought to be fitted anew, such as the first marks. */
  fitAgain?: string
  /** Words for a screen reader. */
  label: string
}

const nodeTypes = { part: PartNode, outline: OutlineNode }
const edgeTypes = { wire: WireEdge }
/** Half of the least target. */
const reachPixels = 24

/** The drawing of a circuit that can be panned, zoomed and measured on. */
export function CircuitSheet(props: CircuitSheetProps) {
  return (
    <ReactFlowProvider>
      <Sheet {...props} />
    </ReactFlowProvider>
  )
}

function Sheet({
  circuit,
  overlay,
  picked = null,
  leads,
  onPick,
  legend,
  first = 'auto',
  fitAgain = '',
  label,
}: CircuitSheetProps) {
  const scene = useMemo(() => buildScene(circuit, overlay, picked), [circuit, overlay, picked])
  const flow = useMemo(() => toFlow(circuit), [circuit])
  const unplugged = overlay.moment?.unplugged
  const places = useMemo(() => pointPlaces(circuit, unplugged ?? []), [circuit, unplugged])
  const view = useSheetView(scene, first)
  const { screenToFlowPosition, getZoom } = useReactFlow()

  const { settle } = view
  const asked = useRef(fitAgain)
  useEffect(() => {
    if (asked.current === fitAgain) return
    asked.current = fitAgain
    settle()
  }, [fitAgain, settle])

  useKeyCommands({
    f: () => view.fit('left'),
    '0': () => view.fit('whole'),
    Home: () => view.fit('whole'),
    '+': () => view.zoomBy(1.25),
    '-': () => view.zoomBy(0.8),
    ArrowLeft: () => view.panBy(60, 0),
    ArrowRight: () => view.panBy(-60, 0),
    ArrowUp: () => view.panBy(0, 60),
    ArrowDown: () => view.panBy(0, -60),
  })

  const pickUnder = (event: MouseEvent) =>
    onPick(
      pickAt(
        scene,
        places,
        screenToFlowPosition({ x: event.clientX, y: event.clientY }, { snapToGrid: false }),
        reachPixels / getZoom(),
      ),
    )

  return (
    <SceneContext.Provider value={scene}>
      <section aria-label={label} className="relative h-full w-full bg-sheet">
        <ReactFlow
          nodes={flow.nodes}
          edges={flow.edges}
          nodeTypes={nodeTypes}
          edgeTypes={edgeTypes}
          connectionMode={ConnectionMode.Loose}
          minZoom={leastZoom}
          maxZoom={mostZoom}
          nodesDraggable={false}
          nodesConnectable={false}
          nodesFocusable={false}
          edgesFocusable={false}
          elementsSelectable={false}
          disableKeyboardA11y
          zoomOnDoubleClick={false}
          deleteKeyCode={null}
          selectionKeyCode={null}
          multiSelectionKeyCode={null}
          zoomActivationKeyCode={null}
          panActivationKeyCode={null}
          onlyRenderVisibleElements={circuit.nodes.length > 150}
          proOptions={{ hideAttribution: true }}
          // Not at its start: a tap that puts a lead starts one, too, and moves nothing.
          onMove={(event) => event && view.moved()}
          onPaneClick={pickUnder}
          onNodeClick={pickUnder}
          onEdgeClick={pickUnder}
        >
          <ViewportPortal>
            <Marks scene={scene} places={places} leads={leads} />
            <SheetPoints
              places={places}
              spoken={(point) => pointName(circuit, point)}
              held={[leads?.red, leads?.black].filter((point): point is string => Boolean(point))}
              onPick={(point, event) => (event.detail > 0 ? pickUnder(event) : onPick({ point }))}
            />
          </ViewportPortal>
        </ReactFlow>
        {legend && (
          <div className="pointer-events-none absolute left-3 top-3 z-controls tablet:left-5">{legend}</div>
        )}
        <SheetButtons view={view} anyLeft={scene.marks.some((mark) => mark.verdict !== 'proved-good')} />
        <div className="pointer-events-none absolute bottom-3 left-3 z-controls hidden rounded-field border-control border-edge bg-window p-1 tablet:block laptop:hidden">
          <KeyMap scene={scene} />
        </div>
      </section>
    </SceneContext.Provider>
  )
}

function Marks({
  scene,
  places,
  leads,
}: {
  scene: Scene
  places: readonly PointPlace[]
  leads: CircuitSheetProps['leads']
}) {
  const zoom = useStore((state) => state.transform[2])
  const at = (point: string | null | undefined) => places.find((place) => place.point === point)
  const red = at(leads?.red)
  const black = at(leads?.black)
  return (
    <svg
      aria-hidden="true"
      focusable="false"
      width={1}
      height={1}
      style={{ position: 'absolute', left: 0, top: 0, overflow: 'visible', pointerEvents: 'none' }}
    >
      <MarksDrawing scene={scene} zoom={zoom} />
      {red && <LeadDrawing lead="red" at={red} />}
      {black && <LeadDrawing lead="black" at={black} />}
    </svg>
  )
}
