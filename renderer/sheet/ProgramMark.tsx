import { runColour, type Paper } from '../../shared-kinetics/figure/run-scale.ts'

/** The program's own mark: ramps of five heating rates that fold into one point. */
export function ProgramMark({ paper }: { readonly paper: Paper }) {
  return (
    <svg className="program-mark" viewBox="0 0 22 22" width="22" height="22" aria-hidden="true">
      {[0, 0.25, 0.5, 0.75, 1].map((place, i) => (
        <path
          key={place}
          d={`M${2 + i * 3.4} 19.5 19.5 3`}
          stroke={runColour(place, paper)}
          strokeWidth="1.7"
          strokeLinecap="round"
          fill="none"
        />
      ))}
    </svg>
  )
}
