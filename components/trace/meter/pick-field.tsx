'use client'

import { classNames } from '../../ui/class-names'

/** The wire a clamp goes round, the load that is looked at; pressing it opens the list. */
export function PickField({
  label,
  value,
  unset,
  onPress,
}: {
  label: string
  value: string | null
  unset: string
  onPress: () => void
}) {
  return (
    <button
      type="button"
      onClick={onPress}
      className="m-px flex min-h-bay min-w-0 flex-1 flex-col justify-center rounded-field border-control border-edge bg-window px-3 text-left hover:border-ink"
    >
      <span className="text-note text-ink-2">{label}</span>
      <span className={classNames('truncate leading-tight', value === null ? 'text-ink-3' : 'font-bold')}>
        {value ?? unset}
      </span>
    </button>
  )
}
