'use client'

import { createContext, useContext } from 'react'
import type { Scene } from './scene'

export const SceneContext = createContext<Scene | null>(null)

export function useScene(): Scene {
  const scene = useContext(SceneContext)
  if (!scene) throw new Error('A part or wire is drawn outside a sheet')
  return scene
}
