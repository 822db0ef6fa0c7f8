import { samples } from '@/diagrams/samples/all-samples'
import { solveOperatingPoint } from '@/diagrams/solver/operating-point'
import { SheetPicture } from './sheet-picture'

/** The simplest sample circuit with its key on, solved when the page is made. */
export function WorkedExample() {
  const circuit = samples[0]
  if (!circuit) return null
  const positions = Object.fromEntries(circuit.controls.map((control) => [control.id, control.rest]))
  for (const control of circuit.controls) positions[control.id] = control.positions.at(-1) ?? control.rest
  const point = solveOperatingPoint(circuit, { controls: positions, unplugged: [], battery: true, added: [] })
  return (
    <figure
      tabIndex={0}
      aria-label="A circuit being operated"
      className="overflow-x-auto border-t border-line bg-sheet px-4 tablet:px-5 py-4"
    >
      <SheetPicture
        circuit={circuit}
        label={`${circuit.title}: the drawing with the voltage at every point`}
        overlay={
          point.ok
            ? {
                volts: point.value.volts,
                wireAmps: point.value.wireAmps,
                moment: { positions, unplugged: [] },
              }
            : {}
        }
      />
    </figure>
  )
}
