import type { Circuit } from '@/diagrams/document/circuit-schema'
import { Plate } from '../ui/plate'

function plural(count: number, one: string): string {
  return `${count} ${one}${count === 1 ? '' : 's'}`
}

/** What a document holds, before it is brought in. */
export function DocumentSummary({ circuit }: { circuit: Circuit }) {
  const counts = [
    plural(circuit.nodes.length, 'part'),
    plural(circuit.wires.length, 'wire'),
    plural(circuit.connectors.length, 'connector'),
    plural(circuit.controls.length, 'control'),
  ]
  return (
    <section aria-label="What the document holds" className="border-y-2 border-ink bg-sheet p-4">
      <div className="flex flex-wrap items-center gap-x-4 gap-y-2">
        <h2 className="text-lead">{circuit.title}</h2>
        {circuit.codes.slice(0, 6).map((entry) => (
          <Plate key={`${entry.code}-${entry.failureType}`}>
            {entry.failureType ? `${entry.code}-${entry.failureType}` : entry.code}
          </Plate>
        ))}
      </div>
      <p className="mt-1 text-body text-ink-2">
        {[circuit.vehicle, circuit.system].filter(Boolean).join(', ') || 'No vehicle given'}
      </p>
      <p className="mt-1 text-body">{counts.join(', ')}. No problems.</p>
    </section>
  )
}
