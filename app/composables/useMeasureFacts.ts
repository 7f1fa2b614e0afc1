import type { FitResult } from '~~/fitting/types'
import type { FitMeasureView } from '#shared/schemas/fits'
import { formatArcsec, formatDirection, formatResidual, formatResidualMas } from '#shared/units/angles'
import { formatDigits, formatNumber } from '#shared/units/number-text'
import { formatDeclination, formatRightAscension } from '#shared/units/sexagesimal'
import { nameOfMeasure } from '#shared/units/warning-text'

const ARCSEC_AN_ARCMIN = 60

interface Fact {
  word: string
  text: string
}

/** A fact where there is a number for it. */
function fact(word: string, value: number | null | undefined, write: (value: number) => string): Fact[] {
  return value === null || value === undefined ? [] : [{ word, text: write(value) }]
}

/** What the page says of one measure: as seen with its σ, against the fit, and its weight in it; and the same in a sentence. */
export function useMeasureFacts(measure: () => FitMeasureView, result: () => FitResult | null) {
  const residual = computed(() => result()?.residuals.find(one => one.id === measure().id))
  const name = computed(() => nameOfMeasure(measure()))
  const seen = computed(() => seenFacts(measure()))

  const against = computed<Fact[]>(() => {
    const differences = residual.value?.observedMinusComputed ?? {}
    return [
      ...fact('O−C θ', differences.thetaDeg, value => `${formatResidual(value)}°`),
      ...fact('O−C ρ', differences.rhoArcsec, value => `${formatResidualMas(value)} mas`),
      ...fact('O−C east', differences.eastArcsec, value => `${formatResidualMas(value)} mas`),
      ...fact('O−C north', differences.northArcsec, value => `${formatResidualMas(value)} mas`),
      ...fact('O−C r', typeof differences.diameterArcmin === 'number' ? null : differences.r, value => formatResidual(value, 5)),
      ...fact('O−C d', differences.diameterArcmin, value => `${formatResidual(value * ARCSEC_AN_ARCMIN)}″`),
      ...fact('O−C α cos δ', differences.raCosDecArcsec, value => `${formatResidual(value)}″`),
      ...fact('O−C δ', differences.decArcsec, value => `${formatResidual(value)}″`),
      ...(measure().sky ? fact('along the motion', differences.alongArcsec, value => `${formatResidual(value)}″`) : []),
      ...(measure().sky ? fact('across it', differences.acrossArcsec, value => `${formatResidual(value)}″`) : []),
      ...fact('in σ', residual.value?.normalised, value => formatNumber(value, 1)),
    ]
  })

  const weightOfIt = computed<Fact[]>(() => [
    ...fact('weight', residual.value?.weight, value => formatDigits(value, 3)),
    ...fact('leverage', residual.value?.leverage, value => formatNumber(value, 3)),
    ...fact("Cook's distance", residual.value?.cook, value => formatNumber(value, 3)),
    ...fact('nights', measure().nights, String),
    ...(measure().method ? [{ word: 'method', text: measure().method! }] : []),
  ])

  const sentence = computed(() => `${name.value}. ${[...seen.value, ...against.value].map(({ word, text }) => `${word} ${text}`).join(', ')}.`)

  return { name, seen, against, weightOfIt, sentence }
}

function seenFacts(measure: FitMeasureView): Fact[] {
  const withSigma = (text: string, sigma: number | null, write: (value: number) => string) => (sigma === null ? text : `${text} ± ${write(sigma)}`)
  return [
    ...skyFacts(measure),
    ...fact('θ', measure.thetaDeg, value => `${withSigma(formatDirection(value), measure.sigmaThetaDeg, sigma => formatNumber(sigma, 2))}°`),
    ...fact('ρ', measure.rhoArcsec, value => `${withSigma(formatArcsec(value), measure.sigmaRhoArcsec, formatArcsec)}″`),
    ...fact('not resolved, ρ below', measure.rhoLimitArcsec, value => `${formatArcsec(value)}″`),
    ...fact('east', measure.eastArcsec, value => `${withSigma(formatArcsec(value), measure.sigmaEastArcsec, formatArcsec)}″`),
    ...fact('north', measure.northArcsec, value => `${withSigma(formatArcsec(value), measure.sigmaNorthArcsec, formatArcsec)}″`),
    ...fact('φ', measure.epochYr === null ? null : measure.phiDeg, value => `${formatDirection(value)}°`),
    ...fact('r', measure.r, value => withSigma(formatNumber(value, 5), measure.sigmaR, sigma => formatNumber(sigma, 5))),
    ...fact('d', measure.diameterArcmin, value => `${withSigma(formatNumber(value, 3), measure.sigmaDiameterArcmin, sigma => formatNumber(sigma, 3))}′`),
  ]
}

function skyFacts({ sky }: FitMeasureView): Fact[] {
  if (!sky) return []
  return [
    { word: 'α', text: formatRightAscension(sky.raDeg) },
    { word: 'δ', text: formatDeclination(sky.decDeg) },
    ...fact('σ of α cos δ', sky.sigmaRaCosDecArcsec, value => `${formatNumber(value, 2)}″`),
    ...fact('σ of δ', sky.sigmaDecArcsec, value => `${formatNumber(value, 2)}″`),
    ...fact('σ of the time', sky.sigmaTimeS, value => `${formatNumber(value, 1)} s`),
    ...fact('magnitude', sky.mag, value => `${formatNumber(value, 1)}${sky.band ? ` ${sky.band}` : ''}`),
    ...(sky.station ? [{ word: 'station', text: sky.station }] : []),
  ]
}
