import type { Verdict } from '@/diagrams/faults/answer'
import { classNames } from '../ui/class-names'
import { VerdictGlyph } from '../ui/verdict-glyph'

/** Every place as one cell in path order: cleared ones narrow between two rails, those left wide. */
export function SplitLine({ places }: { places: readonly { site: string; verdict: Verdict }[] }) {
  return (
    <span aria-hidden="true" className="flex h-7 w-full items-center">
      {places.map(({ site, verdict }, index) => {
        if (verdict === 'proved-good')
          return (
            <span
              key={site}
              className="h-[7px] min-w-[3px] flex-[1_1_0] border-y-2 border-good-band [&+&]:ml-0.5"
            />
          )
        const beside = places[index - 1]
        return (
          <span
            key={site}
            className={classNames(
              'relative flex h-7 items-center justify-center overflow-hidden border-area border-ink bg-window',
              verdict === 'faulty' ? 'flex-[12_1_0]' : 'flex-[3_1_0]',
              beside && beside.verdict !== 'proved-good' && '-ml-0.5',
            )}
          >
            {verdict === 'faulty' ? (
              <span className="flex h-full w-full items-center justify-center border-4 border-faulty-band">
                <VerdictGlyph verdict="faulty" size={16} />
              </span>
            ) : (
              <span
                className="absolute inset-x-0 bottom-0 h-2.5"
                style={{
                  background:
                    'repeating-linear-gradient(90deg, var(--question-band) 0 3px, transparent 3px 6px)',
                }}
              />
            )}
          </span>
        )
      })}
    </span>
  )
}
