import type { PlotLayout, PlotTrace } from 'plotly.js-cartesian-dist-min'
import type { MarkShape, ObserverMark } from '#shared/drawing/observer-marks'
import { axisRange, axisTicksFor, residualTicks } from '#shared/drawing/residual-sheet'
import { halfHeight } from '#shared/drawing/residual-series'
import type { ResidualChart, ResidualPoint, ResidualSeries } from '#shared/drawing/residual-series'
import { formatDigits, formatNumber, formatSigned } from '#shared/units/number-text'
import type { PlotColours } from './usePlotColours'

const SYMBOLS: Record<MarkShape, string> = {
  circle: 'circle', square: 'square-open', triangle: 'triangle-up', diamond: 'diamond-open',
  cross: 'x-thin-open', 'turned-triangle': 'triangle-down-open', plus: 'cross-thin-open', star: 'asterisk-open',
}
/** A triangle or a diamond of the same nominal size looks smaller. */
const SIZES_PX: Partial<Record<MarkShape, number>> = { triangle: 11, 'turned-triangle': 11, diamond: 10 }
const NARROW_PX = 500
const ROW_GAP = 0.14

interface ResidualPlotInput {
  chart: ResidualChart
  lookOf: (id: string) => ObserverMark | undefined
  chosen: string | null
  aside: ReadonlySet<string>
  nowYr: number
  widthPx: number
}

/** Traces and layout of the residual plots: one row a coordinate, a shared axis, the band of the prediction behind the marks. */
export function useResidualPlot(input: () => ResidualPlotInput, colours: () => PlotColours | null) {
  return computed(() => {
    const seen = colours()
    return seen && { traces: tracesOf(input(), seen), layout: layoutOf(input(), seen) }
  })
}

function tracesOf(input: ResidualPlotInput, colours: PlotColours): PlotTrace[] {
  return input.chart.series.flatMap((series, row) => {
    const axes = { xaxis: 'x', yaxis: row === 0 ? 'y' : `y${row + 1}` }
    return [...bandTraces(series, axes, colours), marksTrace(series, axes, input, colours), ringTrace(series, axes, input.chosen, colours)]
  })
}

type Axes = { xaxis: string; yaxis: string }

function bandTraces({ band }: ResidualSeries, axes: Axes, colours: PlotColours): PlotTrace[] {
  if (band.length < 2) return []
  const edge = (sign: number, more: object): PlotTrace => ({
    ...axes, type: 'scatter', mode: 'lines', hoverinfo: 'skip', line: { width: 0 }, ...more,
    x: band.map(point => point.at), y: band.map(point => sign * point.sigma),
  })
  return [edge(-1, {}), edge(1, { fill: 'tonexty', fillcolor: colours.band })]
}

function marksTrace(series: ResidualSeries, axes: Axes, { lookOf, aside, widthPx }: ResidualPlotInput, colours: PlotColours): PlotTrace {
  const hues = [colours.o0, colours.o1, colours.o2, colours.o3, colours.o4]
  const looks = series.points.map(point => lookOf(point.id))
  const isAside = (point: ResidualPoint) => aside.has(point.id) || point.status !== 'used'
  return {
    ...axes, type: 'scatter', mode: 'markers', cliponaxis: false,
    x: series.points.map(point => point.at), y: series.points.map(point => point.value),
    customdata: series.points.map(point => point.id),
    marker: {
      size: looks.map(look => (SIZES_PX[look?.shape ?? 'circle'] ?? 8.5) * (widthPx < NARROW_PX ? 0.8 : 1)),
      symbol: looks.map(look => SYMBOLS[look?.shape ?? 'circle']),
      color: looks.map(look => hues[look?.hue ?? 0]),
      line: { width: looks.map(look => (SYMBOLS[look?.shape ?? 'circle'].endsWith('open') ? 1.9 : 0)) },
      opacity: series.points.map(point => (isAside(point) ? 0.45 : 0.92)),
    },
    hoverinfo: 'text',
    hovertext: series.points.map(point => hoverText(point, series.unit, isAside(point))),
  }
}

function hoverText(point: ResidualPoint, unit: string, isAside: boolean): string {
  const sign = point.value > 0 ? '+' : ''
  const observer = point.observer.replaceAll('&', '&amp;').replaceAll('<', '&lt;')
  return `${formatNumber(point.at, 3)} · ${observer}<br>${sign}${formatDigits(point.value, 3)} ${unit}${isAside ? '<br>set aside' : ''}`
}

function ringTrace({ points }: ResidualSeries, axes: Axes, chosen: string | null, colours: PlotColours): PlotTrace {
  const ringed = points.filter(point => point.id === chosen)
  return {
    ...axes, type: 'scatter', mode: 'markers', hoverinfo: 'skip', cliponaxis: false,
    x: ringed.map(point => point.at), y: ringed.map(point => point.value),
    marker: { symbol: 'circle-open', size: 23, color: colours.mark, line: { width: 2.2 } },
  }
}

function signedTicks(series: ResidualSeries) {
  const { values, decimals } = residualTicks(series)
  return { tickvals: values, ticktext: values.map(value => formatSigned(value, decimals)) }
}

/** Directions and dates keep their own ticks; years are found anew when the plot is zoomed. */
function xTicks(chart: ResidualChart, ticks: readonly { value: number, text: string }[]) {
  if (chart.axis === 'time') return { nticks: ticks.length + 1 }
  return { tickvals: ticks.map(tick => tick.value), ticktext: ticks.map(tick => tick.text) }
}

function layoutOf({ chart, nowYr, widthPx }: ResidualPlotInput, colours: PlotColours): PlotLayout {
  const [least, greatest] = axisRange(chart)
  const ticks = axisTicksFor(chart, widthPx)
  const rows = chart.series.length
  const height = (1 - (rows - 1) * ROW_GAP) / rows
  const tops = chart.series.map((_, row) => 1 - row * (height + ROW_GAP))
  const isNowShown = chart.axis !== 'direction' && nowYr > least && nowYr < greatest
  const quiet = { gridcolor: colours.grid, linecolor: colours.rule, tickcolor: colours.rule, zeroline: false, fixedrange: false }
  const yAxes = Object.fromEntries(chart.series.map((series, row) => [row === 0 ? 'yaxis' : `yaxis${row + 1}`, {
    ...quiet, domain: [tops[row]! - height, tops[row]!], range: [-halfHeight(series), halfHeight(series)],
    ...signedTicks(series), zeroline: true, zerolinecolor: colours.orbit, zerolinewidth: 1.4, ticks: '',
  }]))
  return {
    paper_bgcolor: colours.sheet, plot_bgcolor: colours.sheet, showlegend: false, autosize: true, uirevision: 'kept', separators: '.',
    font: { family: '"Nunito Sans Variable", sans-serif', size: 12, color: colours.ink2 },
    margin: { l: 54, r: 16, t: 26, b: 30 }, hovermode: 'closest',
    hoverlabel: { bgcolor: colours.sheet, bordercolor: colours.ink2, font: { color: colours.ink } },
    modebar: { bgcolor: 'rgba(0,0,0,0)', color: colours.ink2, activecolor: colours.orbit },
    dragmode: matchMedia('(pointer: coarse)').matches ? false : 'zoom',
    xaxis: { ...quiet, range: [least, greatest], anchor: rows > 1 ? `y${rows}` : 'y', ...xTicks(chart, ticks), showgrid: false },
    ...yAxes,
    annotations: chart.series.map((series, row) => ({
      xref: 'paper', yref: 'paper', x: 0, y: tops[row], xanchor: 'left', yanchor: 'bottom', yshift: 4, showarrow: false,
      text: `${series.name} (${series.symbols}), ${series.unit}`, font: { color: colours.ink2, size: 13 },
    })),
    shapes: isNowShown ? [{ type: 'line', xref: 'x', yref: 'paper', x0: nowYr, x1: nowYr, y0: 0, y1: 1, line: { color: colours.ink2, width: 1, dash: 'dot' } }] : [],
  }
}
