'use client'

import { useSyncExternalStore } from 'react'
import { Choice } from '../ui/choice'
import { chooseTheme, readTheme, type ThemeChoice, watchTheme } from './theme'

const options = [
  { value: 'light', label: 'Light' },
  { value: 'dark', label: 'Dark' },
  { value: 'device', label: 'As device' },
] as const satisfies readonly { value: ThemeChoice; label: string }[]

export function ThemeSwitch({ fill = false }: { fill?: boolean }) {
  const choice = useSyncExternalStore<ThemeChoice>(watchTheme, readTheme, () => 'device')
  return <Choice label="Light or dark" options={options} value={choice} onChange={chooseTheme} fill={fill} />
}
