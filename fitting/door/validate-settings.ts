/** Settings are served or refused; none is ignored. */
import type { FitSettings, Kind } from '../types'
import { refuse } from './refusal'

const LATER = 'Leave the setting out, or give its default.'

/** Settings of which only the default is served so far, with that default. */
const DEFAULT_ONLY: Partial<Record<keyof FitSettings, unknown>> = {
  conicClass: 'any', forces: 'sun', normalPoints: false, thetaEquinox: 2000,
}

/** Settings that have a meaning, by kind. */
const SERVED: Record<Kind, readonly (keyof FitSettings)[]> = {
  relative: ['model', 'loss', 'weights', 'hold', 'frameOffset', 'targetPosition', 'errors', 'shortestPeriodYr', 'sigmaScale', 'seed', ...(Object.keys(DEFAULT_ONLY) as (keyof FitSettings)[])],
  plane: ['model', 'loss', 'weights', 'hold', 'sigmaScale', 'seed', 'diameterScaleArcmin', 'radiusUnit', ...(Object.keys(DEFAULT_ONLY) as (keyof FitSettings)[])],
  equatorial: ['model', 'loss', 'weights', 'sigmaScale', 'seed', ...(Object.keys(DEFAULT_ONLY) as (keyof FitSettings)[])],
}

const CHOICES: Partial<Record<keyof FitSettings, readonly unknown[]>> = {
  model: ['kepler', 'line', 'still'], loss: ['squares', 'huber', 'biweight'], weights: ['stated', 'equal', 'by-observer'],
  errors: ['linear', 'profile'], conicClass: ['any', 'ellipse', 'parabola', 'circle'], frameOffset: ['none', 'offset', 'offset-and-drift'], forces: ['sun', 'planets'], normalPoints: [true, false],
}

/** Finite number above the lower bound and up to the upper. */
const RANGES: Partial<Record<keyof FitSettings, readonly [number, number]>> = {
  shortestPeriodYr: [0, 1e6], sigmaScale: [0, 1e6], diameterScaleArcmin: [0, 1e9], seed: [-1, 4294967295], thetaEquinox: [1599, 2500],
}

/** Served models and weights of this engine version. */
const MODELS: Record<Kind, readonly string[]> = { relative: ['kepler', 'line', 'still'], plane: ['kepler'], equatorial: ['kepler'] }
const WEIGHTS: Record<Kind, readonly string[]> = { relative: ['stated', 'equal', 'by-observer'], plane: ['stated', 'equal'], equatorial: ['stated', 'equal'] }

/** Robust losses are served for orbits of double stars only. */
function isLossServed(kind: Kind, { loss, model }: FitSettings): boolean {
  return loss === undefined || loss === 'squares' || (kind === 'relative' && (model ?? 'kepler') === 'kepler')
}

/** What is served beyond the defaults. */
function isServedBeyond(kind: Kind, name: keyof FitSettings, value: unknown): boolean {
  if (kind === 'equatorial') return name === 'forces' || (name === 'conicClass' && value === 'parabola')
  if (kind === 'plane') return name === 'conicClass'
  return name === 'conicClass' || name === 'normalPoints' || name === 'thetaEquinox'
}

function checkValue(name: keyof FitSettings, value: unknown): void {
  const choices = CHOICES[name]
  if (choices && !choices.includes(value)) refuse('setting-out-of-range', `The setting ${name} has a value that is not known.`, `Give one of: ${choices.join(', ')}.`)
  const range = RANGES[name]
  if (range && !(typeof value === 'number' && value > range[0] && value <= range[1])) {
    refuse('setting-out-of-range', `The setting ${name} is not a number above ${range[0]} and up to ${range[1]}.`, 'Give a number inside that range.')
  }
  if (name === 'radiusUnit' && (typeof value !== 'string' || value.length === 0 || value.length > 40)) {
    refuse('setting-out-of-range', 'The setting radiusUnit is not a name of 1 to 40 characters.', 'Name the unit of r, for example au.')
  }
}

/**
 * Refuses settings that are out of range, unknown or not served.
 * @param kind of the request.
 * @param settings as given.
 * @throws RefusedRequest 'setting-out-of-range' or 'setting-not-available'.
 */
export function validateSettings(kind: Kind, settings: FitSettings): void {
  if (typeof settings !== 'object' || settings === null) refuse('setting-out-of-range', 'The settings are not a set of named values.', 'Leave them out, or give an object.')
  for (const name of Object.keys(settings) as (keyof FitSettings)[]) {
    const value = settings[name]
    if (value === undefined) continue
    if (!SERVED[kind].includes(name)) refuse('setting-not-available', `The setting ${String(name).slice(0, 40)} is not available for ${kind} fits.`, LATER)
    checkValue(name, value)
    if (name in DEFAULT_ONLY && value !== DEFAULT_ONLY[name] && !isServedBeyond(kind, name, value)) {
      refuse('setting-not-available', `The setting ${name} = ${String(value)} is not available in this version of the engine.`, LATER)
    }
  }
  if (settings.model !== undefined && !MODELS[kind].includes(settings.model)) {
    refuse('setting-not-available', `The model ${settings.model} is not available for ${kind} fits.`, LATER)
  }
  if (!isLossServed(kind, settings)) {
    refuse('setting-not-available', `The loss ${settings.loss} is not available for this fit.`, 'Leave it out for least squares; huber and biweight are available for orbits of double stars.')
  }
  if (settings.frameOffset !== undefined && settings.frameOffset !== 'none' && (settings.model ?? 'kepler') !== 'kepler') {
    refuse('setting-not-available', `With the model ${settings.model} an offset of the reference point cannot be told from the motion itself.`, 'Leave frameOffset out, or fit an orbit.')
  }
  if (settings.normalPoints && ((settings.model ?? 'kepler') !== 'kepler' || (settings.loss ?? 'squares') !== 'squares')) {
    refuse('setting-not-available', 'Normal points are means about an orbit by least squares: they go with no other model and no robust loss.', 'Set outliers aside first, then fit normal points with squares.')
  }
  if (settings.weights !== undefined && !WEIGHTS[kind].includes(settings.weights)) {
    refuse('setting-not-available', `The weights ${settings.weights} are not available for ${kind} fits.`, LATER)
  }
}
