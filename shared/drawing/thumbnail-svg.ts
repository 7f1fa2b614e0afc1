import type { FitResult } from '../../fitting/types'
import { conicOutline } from './conic-outline'
import type { ConicOutline, Point } from './conic-outline'
import { frameAround } from './drawing-frame'

const WIDTH_PX = 84
const HEIGHT_PX = 64
const MARGIN_PX = 5
const FOCUS_RADIUS_PX = 3

/**
 * Draws a result small: its curve and its focus, for lists and mail. The colours are the surrounding text's; there is no style
 * attribute (the content policy refuses them) and nothing but numbers comes from the result, so the text is safe to insert as it is.
 * @param result a finished fit.
 * @returns one SVG element, hidden from assistive technology (the words beside it say the same); null where there is no curve.
 */
export function thumbnailSvg(result: FitResult): string | null {
  const outline = conicOutline(result)
  if (outline === null || !outline.points.every(isFinitePoint)) return null
  const focus = { x: 0, y: 0 }
  const frame = frameAround([...outline.points, focus], {
    widthPx: WIDTH_PX, heightPx: HEIGHT_PX, marginPx: MARGIN_PX, isEastLeft: result.kind === 'relative',
  })
  const focusPx = frame.toPx(focus)
  return `<svg xmlns="http://www.w3.org/2000/svg" viewBox="0 0 ${WIDTH_PX} ${HEIGHT_PX}" width="${WIDTH_PX}" height="${HEIGHT_PX}" aria-hidden="true" focusable="false">`
    + `<path class="orbit" d="${pathData(outline, frame.toPx)}" fill="none" stroke="currentColor" stroke-width="2" stroke-linejoin="round" stroke-linecap="round"/>`
    + `<circle class="focus" cx="${px(focusPx.x)}" cy="${px(focusPx.y)}" r="${FOCUS_RADIUS_PX}" fill="currentColor"/></svg>`
}

/**
 * Writes an outline as the `d` attribute of an SVG path.
 * @param outline the curve.
 * @param toPx places to pixels, as a DrawingFrame does it.
 * @returns path data to a tenth of a pixel.
 */
export function pathData(outline: ConicOutline, toPx: (point: Point) => Point): string {
  const corners = outline.points.map(toPx).map(({ x, y }) => `${px(x)} ${px(y)}`)
  return `M${corners.join('L')}${outline.shape === 'closed' ? 'Z' : ''}`
}

function px(value: number): string {
  return String(Math.round(value * 10) / 10)
}

function isFinitePoint({ x, y }: Point): boolean {
  return Number.isFinite(x) && Number.isFinite(y)
}
