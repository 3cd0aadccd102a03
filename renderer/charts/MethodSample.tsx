import { methodDash, methodMarker } from './markers.ts'
import { MarkerShape } from './RunMarker.tsx'

/** Line style and marker of a method, as in the chart; `index` 0 is the chosen method. */
export function MethodSample({ index }: { readonly index: number }) {
  const colour = index === 0 ? 'var(--accent)' : 'var(--ink-soft)'
  return (
    <span className="method-sample" aria-hidden="true">
      <svg viewBox="0 0 30 14" width="30" height="14">
        <line
          x1="1"
          y1="7"
          x2="29"
          y2="7"
          stroke={colour}
          strokeWidth={index === 0 ? 2 : 1.5}
          strokeDasharray={methodDash(index).join(' ')}
        />
      </svg>
      <MarkerShape marker={methodMarker(index)} colour={colour} paper="var(--paper)" />
    </span>
  )
}
