'use client'

import { classNames } from '../../ui/class-names'
import { LeadGlyph } from '../../ui/lead-glyph'

/** Where a lead is; pressing it opens the list of points, and the next tap on the sheet goes to this lead. */
export function LeadField({
  lead,
  point,
  active,
  onPress,
}: {
  lead: 'red' | 'black'
  point: string | null
  active: boolean
  onPress: () => void
}) {
  return (
    <button
      type="button"
      onClick={onPress}
      data-lead={lead}
      className={classNames(
        'flex min-h-bay min-w-0 flex-1 flex-col justify-center rounded-field bg-window px-3 text-left hover:border-ink',
        active ? 'border-area border-ink' : 'm-px border-control border-edge',
      )}
    >
      <span className="text-note text-ink-2">{lead === 'red' ? 'Red lead' : 'Black lead'}</span>
      <span className="flex min-w-0 items-center gap-2 text-dense font-bold leading-tight">
        <LeadGlyph lead={lead} size={20} />
        <span className={classNames('truncate', point === null && 'font-normal text-ink-3')}>
          {point ?? 'tap a point'}
        </span>
      </span>
    </button>
  )
}
