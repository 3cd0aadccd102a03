import type { ChartOptions, TooltipItem } from 'chart.js'
import { niceStep, niceTicks, tickText } from '../../shared-kinetics/figure/nice-axis.ts'
import type { Axis, Figure } from '../../shared-kinetics/figure/figure.ts'
import { axisTitle } from './axis-text-plugin.ts'
import type { ChartColours } from './chart-colours.ts'
import { chartFont } from './chart-font.ts'
import { rulesOf } from './figure-rules.ts'

export type FigureChartType = 'scatter'

/** Everything about a chart but its data and what it calls back. */
export function chartOptions(figure: Figure, colours: ChartColours): ChartOptions<FigureChartType> {
  const font = { family: chartFont, size: 12 }
  const scale = (axis: Axis): NonNullable<ChartOptions<FigureChartType>['scales']>[string] => ({
    type: 'linear',
    ...(axis.min === null ? {} : { min: axis.min }),
    ...(axis.max === null ? {} : { max: axis.max }),
    grid: { color: colours.grid, drawTicks: false },
    border: { color: colours.hairline },
    ticks: { color: colours.softInk, font, padding: 7, maxRotation: 0, autoSkipPadding: 14, callback: tickCallback },
    // Holds the room; the text itself is drawn by the axis-text plugin.
    title: {
      display: true,
      text: axisTitle(axis).replace(/\^[\d.]+/g, ''),
      color: 'transparent',
      font: { ...font, size: 11 },
      padding: 2,
    },
    // Round steps on screen and in exported figures alike; Chart.js would add the ends of the axis to its own.
    afterBuildTicks: (built) => {
      const steps = built.isHorizontal() ? built.width / 50 : built.height / 42
      built.ticks = niceTicks(built.min, built.max, Math.min(10, Math.max(2, Math.round(steps)))).map((value) => ({ value }))
    },
  })
  return {
    animation: false,
    responsive: true,
    maintainAspectRatio: false,
    parsing: false,
    layout: { padding: { top: figure.x.second === null ? 8 : 26, right: 18, bottom: 0, left: 0 } },
    scales: { x: scale(figure.x), y: scale(figure.y) },
    interaction: { mode: 'nearest', intersect: true },
    plugins: {
      legend: { display: false },
      annotation: { annotations: rulesOf(figure, colours) },
      tooltip: {
        backgroundColor: colours.ink,
        titleColor: colours.paper,
        bodyColor: colours.paper,
        titleFont: { ...font, weight: 600 },
        bodyFont: font,
        displayColors: false,
        cornerRadius: 2,
        padding: 8,
        caretSize: 5,
        callbacks: {
          title: (items) => items[0]?.dataset.label ?? '',
          label: (item) => describePoint(item, figure),
        },
      },
    },
  }
}

function tickCallback(
  this: { readonly chart: unknown },
  value: string | number,
  _index: number,
  ticks: readonly { readonly value: number }[],
): string {
  const step = ticks.length < 2 ? 1 : Math.abs((ticks[1]?.value ?? 0) - (ticks[0]?.value ?? 0))
  return tickText(Number(value), step)
}

function describePoint(item: TooltipItem<FigureChartType>, figure: Figure): string[] {
  const { x, y } = item.parsed
  return [valueText(figure.x, x ?? Number.NaN, item.chart.scales.x), valueText(figure.y, y ?? Number.NaN, item.chart.scales.y)]
}

function valueText(axis: Axis, value: number, scale: { readonly min: number; readonly max: number } | undefined): string {
  const step = scale === undefined ? 1 : niceStep((scale.max - scale.min) / 1000)
  return `${axis.label.replace(/\^/g, '^')} ${tickText(value, step)} ${axis.unit}`.trim()
}
