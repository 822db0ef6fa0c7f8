import { ButtonLink } from '../ui/button'
import { PublicFoot } from './public-foot'
import { PublicHead } from './public-head'
import { WorkedExample } from './worked-example'

const steps = [
  {
    title: 'Operate',
    text: 'Turn the key on the drawing, press the switch, pull a fuse. Every point shows the voltage it should have, every wire whether it carries current.',
  },
  {
    title: 'Trace',
    text: 'Tap two points and type what the meter shows. The drawing marks what is left, and names the reading that splits it best for the minutes it costs.',
  },
  {
    title: 'Prove the repair',
    text: 'A trace ends with a confirming reading. The annotated drawing, with readings, verdict and date, goes to whoever asks for it.',
  },
]

/** What the product does, shown on a real answer: drawing over rule over tray, as at work. */
export function Landing() {
  return (
    <div className="flex min-h-dvh flex-col">
      <PublicHead />
      <main className="flex flex-1 flex-col">
        <div className="bg-sheet px-4 tablet:px-5 pt-8 pb-5 tablet:pt-10">
          <div className="mx-auto max-w-6xl">
            <h1 className="max-w-3xl text-[2rem] tablet:text-[2.75rem] font-extrabold leading-[1.08]">
              A trouble code names a circuit. The fault is one place in it.
            </h1>
            <p className="mt-4 max-w-2xl text-body tablet:text-[1.125rem] text-ink-2">
              Halfsplit holds wiring as circuits that can be worked out. It knows what every point should
              read, takes in what the meter showed, and says which places are still in question, which are
              proved good and by which reading, and where to measure next.
            </p>
            <div className="mt-5 flex flex-wrap gap-2">
              <ButtonLink href="/sign-up" look="filled" size="bay">
                Make an account
              </ButtonLink>
              <ButtonLink href="/sign-in" size="bay">
                Sign in
              </ButtonLink>
            </div>
          </div>
        </div>
        <WorkedExample />
        <section aria-label="What one does with it" className="flex-1 bg-tray">
          <div className="mx-auto grid max-w-6xl tablet:grid-cols-3">
            {steps.map((step) => (
              <div
                key={step.title}
                className="border-edge px-4 tablet:px-5 py-5 max-tablet:border-b tablet:not-last:border-r min-[75rem]:first:pl-0"
              >
                <h2 className="text-lead">{step.title}</h2>
                <p className="mt-2 text-body text-ink-2">{step.text}</p>
              </div>
            ))}
          </div>
        </section>
        <section className="border-t-2 border-ink bg-sheet px-4 tablet:px-5 py-6">
          <div className="mx-auto grid max-w-6xl gap-x-10 gap-y-4 tablet:grid-cols-2">
            <div>
              <h2 className="text-lead">In the bay</h2>
              <p className="mt-2 text-body text-ink-2">
                From code to circuit to cavity in one search. Readings are kept on the tablet when the network
                is not there, and sent when it is. An ohms reading on a live circuit is refused with the
                reason.
              </p>
            </div>
            <div>
              <h2 className="text-lead">In the classroom</h2>
              <p className="mt-2 text-body text-ink-2">
                The same circuits, operated on the wall and traced at the bench. Each mark says why it stands
                there, so that splitting in half becomes a habit and guessing does not.
              </p>
            </div>
          </div>
        </section>
      </main>
      <PublicFoot />
    </div>
  )
}
