import { runMarker, type Marker } from './markers.ts'

/** A run's marker in its colour, as in the charts: the legend of every figure is the table it stands in. */
export function RunMarker({ index, colour }: { readonly index: number; readonly colour: string }) {
  return <MarkerShape marker={runMarker(index)} colour={colour} paper="var(--paper)" />
}

export function MarkerShape({ marker, colour, paper }: { readonly marker: Marker; readonly colour: string; readonly paper: string }) {
  const paint = { fill: marker.hollow ? paper : colour, stroke: colour, strokeWidth: 1.6 }
  return (
    <svg className="marker" viewBox="-7 -7 14 14" width="14" height="14" aria-hidden="true">
      <g transform={`rotate(${marker.rotation})`}>{shapeOf(marker, paint)}</g>
    </svg>
  )
}

function shapeOf(marker: Marker, paint: { readonly fill: string; readonly stroke: string; readonly strokeWidth: number }) {
  switch (marker.style) {
    case 'circle':
      return <circle r="4.6" {...paint} />
    case 'rect':
      return <rect x="-4.1" y="-4.1" width="8.2" height="8.2" {...paint} />
    case 'triangle':
      return <path d="M0-5.2 4.7 3.2H-4.7Z" {...paint} />
    case 'rectRot':
      return <path d="M0-5.6 5.6 0 0 5.6-5.6 0Z" {...paint} />
  }
}
