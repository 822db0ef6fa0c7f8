import { labelObstacles } from '@/diagrams/drawing/drawn-wires'
import type { Box } from '@/diagrams/drawing/primitive'
import type { PlacedMark, Scene } from './scene'

const marginPixels = 24

/** Everything that is drawn: parts and their names, wires, flags. */
export function wholeBounds(scene: Scene): Box {
  const wires = [...scene.wires.values()].flatMap(({ route, label }) => [
    ...route.map((place) => ({ ...place, width: 0, height: 0 })),
    ...(label ? [label.plate] : []),
  ])
  return unite([
    ...labelObstacles(scene.circuit),
    ...wires,
    ...scene.flags.map((flag) => flag.box),
    ...scene.plates.map((plate) => plate.box),
  ])
}

/** Where the next lead goes, with what stands around it; null when nothing is flagged. */
export function flagBounds(scene: Scene): Box | null {
  return scene.flags.length === 0
    ? null
    : unite(
        scene.flags.map((flag) => flag.box),
        120,
      )
}

/** What is left: faulty places and those in question; null when nothing is marked so. */
export function leftBounds(scene: Scene): Box | null {
  return boundsOf(
    scene,
    scene.marks.filter((mark) => mark.verdict !== 'proved-good'),
  )
}

/** The faulty places alone, with what stands around them; null when none is. */
export function faultyBounds(scene: Scene): Box | null {
  return boundsOf(
    scene,
    scene.marks.filter((mark) => mark.verdict === 'faulty'),
  )
}

function boundsOf(scene: Scene, left: readonly PlacedMark[]): Box | null {
  if (left.length === 0) return null
  return unite(
    left.flatMap((mark): Box[] => {
      if (mark.ring) return [mark.ring]
      const drawn = scene.wires.get(mark.site.slice('wire:'.length))
      return drawn ? drawn.route.map((place) => ({ ...place, width: 0, height: 0 })) : []
    }),
    60,
  )
}

function unite(boxes: readonly Box[], margin = marginPixels): Box {
  if (boxes.length === 0) return { x: 0, y: 0, width: 400, height: 200 }
  const left = Math.min(...boxes.map((box) => box.x)) - margin
  const top = Math.min(...boxes.map((box) => box.y)) - margin
  return {
    x: left,
    y: top,
    width: Math.max(...boxes.map((box) => box.x + box.width)) + margin - left,
    height: Math.max(...boxes.map((box) => box.y + box.height)) + margin - top,
  }
}
