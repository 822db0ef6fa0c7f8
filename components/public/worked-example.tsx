import type { Circuit } from '@/diagrams/document/circuit-schema'
import { pointName } from '@/diagrams/document/points'
import { siteName, sitesOf } from '@/diagrams/document/sites'
import { placeMark } from '@/diagrams/drawing/verdict-mark'
import { samples } from '@/diagrams/samples/all-samples'
import { Plate } from '../ui/plate'
import { VerdictGlyph } from '../ui/verdict-glyph'
import { type Step, splitAlong } from './half-splitting'
import { SheetPicture } from './sheet-picture'
import { SplitLine } from './split-line'

const title = 'Load space lamp request'
const fault = { site: 'contact:c12-3', mode: 'open' as const }
const controls = { key: 'on' }
const points = ['body.5', 'c12-3.a', 'c12-3.b']

/** One trace on a sample circuit, solved and evaluated when the page is made: sheet, then the rule after each reading. */
export function WorkedExample() {
  const circuit = samples.find((sample) => sample.title === title)
  if (!circuit) return null
  const steps = splitAlong(circuit, fault, controls, points)
  const last = steps.at(-1)
  if (!last) return null
  const order = leftToRight(circuit)
  return (
    <section aria-label="An example">
      <figure
        tabIndex={0}
        aria-label={`${circuit.title}, the drawing`}
        className="overflow-x-auto border-t border-line bg-sheet px-4 tablet:px-5 pt-2 pb-4"
      >
        <SheetPicture
          circuit={circuit}
          label={`${circuit.title}: ${last.answer.says}`}
          overlay={{
            verdicts: new Map(last.answer.sites.map((site) => [site.site, site.verdict])),
            moment: { positions: controls, unplugged: [] },
            flags: steps.map((step, index) => ({
              at: step.reading.red,
              number: `R${index + 1}`,
              value: volts(step),
            })),
          }}
        />
      </figure>
      <div className="border-y-2 border-ink bg-panel px-4 tablet:px-5 py-4">
        <div className="mx-auto max-w-6xl">
          <p className="text-body text-ink-2">
            Key on, the lamp request does not arrive. {order.length} places could be at fault; three readings,
            red lead to chassis:
          </p>
          <ol className="mt-2">
            {steps.map((step, index) => (
              <Rule key={step.reading.id} circuit={circuit} step={step} order={order} number={index + 1} />
            ))}
          </ol>
          <p className="mt-3 flex items-start gap-3 text-lead">
            <VerdictGlyph verdict="faulty" size={26} />
            <span>{last.answer.says}</span>
          </p>
          <p className="mt-1.5 text-small text-ink-2">
            The other places are cleared if there is one fault and no reading is wrong. Values worked out by
            the solver with that contact open, marks by the evaluator.
          </p>
        </div>
      </div>
    </section>
  )
}

function Rule({
  circuit,
  step,
  order,
  number,
}: {
  circuit: Circuit
  step: Step
  order: readonly string[]
  number: number
}) {
  const verdicts = new Map(step.answer.sites.map((site) => [site.site, site.verdict]))
  const places = order.map((site) => ({ site, verdict: verdicts.get(site) ?? ('in-question' as const) }))
  const faulty = places.filter((place) => place.verdict === 'faulty')
  const left = places.filter((place) => place.verdict !== 'proved-good').length
  return (
    <li className="grid items-center gap-x-5 gap-y-1.5 border-b border-line py-2.5 tablet:grid-cols-[minmax(0,19rem)_minmax(0,1fr)_9rem]">
      <span className="flex items-baseline gap-2.5">
        <Plate look="inverted" figures={false}>
          R{number}
        </Plate>
        <span className="min-w-0 flex-1 text-dense">{pointName(circuit, step.reading.red)}</span>
        <span className="figures font-bold whitespace-nowrap">{volts(step)}</span>
      </span>
      <SplitLine places={places} />
      <span className="font-bold tablet:text-right">
        {faulty.length > 0
          ? faulty.map((place) => siteName(circuit, place.site)).join(' or ')
          : `${left} places left`}
      </span>
    </li>
  )
}

function volts(step: Step): string {
  return `${step.reading.value === 'OL' ? 'OL' : step.reading.value.toFixed(2)} V`
}

/** Samples are drawn from feed to ground, so left to right is the way the current takes. */
function leftToRight(circuit: Circuit): string[] {
  const place = (site: string) => placeMark(circuit, site)?.glyph.x ?? 0
  return sitesOf(circuit)
    .map((site) => site.id)
    .toSorted((one, other) => place(one) - place(other))
}
