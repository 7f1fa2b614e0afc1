// The cartesian bundle ships no types; these are the parts of it that are used here.
declare module 'plotly.js-cartesian-dist-min' {
  export interface PlotTrace {
    [attribute: string]: unknown
    x: readonly (number | null)[]
    y: readonly (number | null)[]
    customdata?: readonly string[]
  }
  export type PlotLayout = Record<string, unknown>
  export type PlotConfig = Record<string, unknown>

  export interface PlotPoint {
    customdata?: string
    curveNumber: number
    pointIndex: number
  }
  export interface PlotElement extends HTMLElement {
    removeAllListeners: (event: 'plotly_click') => void
    on: (event: 'plotly_click', listener: (event: { points: PlotPoint[] }) => void) => void
  }

  interface PlotLibrary {
    react: (element: HTMLElement, traces: PlotTrace[], layout: PlotLayout, config?: PlotConfig) => Promise<PlotElement>
    purge: (element: HTMLElement) => void
    toImage: (element: HTMLElement, options: { format: 'svg' | 'png', width: number, height: number, scale?: number }) => Promise<string>
  }
  const library: PlotLibrary
  export default library
}
