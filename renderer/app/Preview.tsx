import { useColours } from '../state/services.ts'

const runs = [0, 0.25, 0.5, 0.75, 1]

/** A drawing without numbers: runs at several heating rates, and the Ea against conversion that they fold into. */
export function Preview() {
  const colours = useColours()
  return (
    <div
      className="preview"
      // oxlint-disable-next-line jsx-a11y/prefer-tag-over-role -- drawn in place, so that it follows the theme
      role="img"
      aria-label="Drawing: conversion curves of five runs, slow to fast, and the activation energy against conversion that follows from them, with its interval."
    >
      <svg viewBox="0 0 560 210" aria-hidden="true">
        <g transform="translate(8 14)">
          <path className="preview-axis" d="M0 0V160H220" />
          {runs.map((place, i) => (
            <path
              key={place}
              d={`M0 6H${58 + i * 17}C${92 + i * 19} 8 ${96 + i * 19} 148 ${138 + i * 20} 152H220`}
              stroke={colours.run(place)}
              className="preview-curve"
            />
          ))}
          <text x="110" y="182">
            signal against temperature
          </text>
        </g>
        <path className="preview-arrow" d="M246 94H292M286 88 293 94 286 100" />
        <g transform="translate(318 14)">
          <path className="preview-axis" d="M0 0V160H226" />
          <path className="preview-band" d="M10 104C70 100 96 92 118 58S170 16 216 14V50C176 52 156 66 134 96S70 132 10 136Z" />
          <path className="preview-result" d="M10 120C70 116 100 106 126 76S170 34 216 32" />
          <text x="113" y="182">
            Ea against conversion α
          </text>
        </g>
      </svg>
    </div>
  )
}
