/** A marker by Chart.js's names, so that chart, overlay and the table's drawing are the same shape. */
export interface Marker {
  readonly style: 'circle' | 'rect' | 'triangle' | 'rectRot'
  readonly rotation: 0 | 180
  readonly hollow: boolean
  /** Radius relative to a disc's that makes the shape look as large. */
  readonly scale: number
  /** The shape in a word, for people who hear the screen. */
  readonly word: string
}

const shapes: readonly Omit<Marker, 'hollow'>[] = [
  { style: 'circle', rotation: 0, scale: 1, word: 'disc' },
  { style: 'rect', rotation: 0, scale: 1.2, word: 'square' },
  { style: 'triangle', rotation: 0, scale: 1.3, word: 'triangle' },
  { style: 'rectRot', rotation: 0, scale: 1.25, word: 'diamond' },
  { style: 'triangle', rotation: 180, scale: 1.3, word: 'triangle pointing down' },
]

function markerAt(index: number, firstHollow: boolean): Marker {
  const shape = shapes[index % shapes.length] ?? { style: 'circle', rotation: 0, scale: 1, word: 'disc' }
  const secondRound = Math.floor(index / shapes.length) % 2 === 1
  const hollow = firstHollow !== secondRound
  return { ...shape, hollow, word: hollow ? `hollow ${shape.word}` : shape.word }
}

/** A run's own marker: five filled shapes, then the same hollow; colour tells the rest apart. */
export const runMarker = (index: number): Marker => markerAt(index, false)

/** A method's marker: hollow first, so that methods never look like runs. */
export const methodMarker = (index: number): Marker => markerAt(index, true)

/** Line style of a method as dash lengths in pixels; the chosen one is solid. */
export const methodDash = (index: number): readonly number[] => dashes[index % dashes.length] ?? []

const dashes: readonly (readonly number[])[] = [[], [1.5, 4], [7, 4], [7, 3, 1.5, 3], [12, 4], [2, 2]]
