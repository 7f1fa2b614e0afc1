/**
 * Mean elements of the planets on the ecliptic and equinox of J2000 and the largest periodic terms of a and of the mean longitude.
 *
 * Source: Simon et al. 1994, Numerical expressions for precession formulae and mean elements for the Moon and the planets, A&A 282, 663,
 * as listed in eraPlan94 of ERFA 2.0. Copyright (C) 2013-2021, NumFOCUS Foundation. All rights reserved. Derived, with permission, from
 * the SOFA library of the International Astronomical Union. Conditions and disclaimer: LICENSE-ERFA in this folder.
 *
 * @license BSD-3-Clause (ERFA)
 */
import type { Planet } from './planets'

/** Value at J2000, rate a Julian millennium and a millennium squared. */
type Coefficients = readonly [number, number, number]

/** Of one planet. Angles: degrees, then arcseconds a millennium and a millennium squared. Periodic terms: 1e-7 au and 1e-7 rad. */
export interface PlanetTerms {
  semiMajorAxisAu: Coefficients
  longitude: Coefficients
  eccentricity: Coefficients
  perihelion: Coefficients
  inclination: Coefficients
  node: Coefficients
  axisMultiples: readonly number[]
  axisCosine: readonly number[]
  axisSine: readonly number[]
  longitudeMultiples: readonly number[]
  longitudeCosine: readonly number[]
  longitudeSine: readonly number[]
}

/** By planet. */
export const PLANET_TERMS: Readonly<Record<Planet, PlanetTerms>> = {
  'mercury': {
    semiMajorAxisAu: [0.3870983098, 0, 0],
    longitude: [252.25090552, 5381016286.88982, -1.92789],
    eccentricity: [0.2056317526, 0.0002040653, -2.8349e-6],
    perihelion: [77.45611904, 5719.1159, -4.83016],
    inclination: [7.00498625, -214.25629, 0.28977],
    node: [48.33089304, -4515.21727, -31.79892],
    axisMultiples: [69613, 75645, 88306, 59899, 15746, 71087, 142173, 3086, 0],
    axisCosine: [4, -13, 11, -9, -9, -3, -1, 4, 0],
    axisSine: [-29, -1, 9, 6, -6, 5, 4, 0, 0],
    longitudeMultiples: [3086, 15746, 69613, 59899, 75645, 88306, 12661, 2658, 0, 0],
    longitudeCosine: [21, -95, -157, 41, -5, 42, 23, 30, 0, 0],
    longitudeSine: [-342, 136, -23, 62, 66, -52, -33, 17, 0, 0],
  },
  'venus': {
    semiMajorAxisAu: [0.72332982, 0, 0],
    longitude: [181.97980085, 2106641364.33548, 0.59381],
    eccentricity: [0.0067719164, -0.0004776521, 9.8127e-6],
    perihelion: [131.563703, 175.4864, -498.48184],
    inclination: [3.39466189, -30.84437, -11.67836],
    node: [76.67992019, -10008.48154, -51.32614],
    axisMultiples: [21863, 32794, 26934, 10931, 26250, 43725, 53867, 28939, 0],
    axisCosine: [-156, 59, -42, 6, 19, -20, -10, -12, 0],
    axisSine: [-48, -125, -26, -37, 18, -13, -20, -2, 0],
    longitudeMultiples: [21863, 32794, 10931, 73, 4387, 26934, 1473, 2157, 0, 0],
    longitudeCosine: [-160, -313, -235, 60, -74, -76, -27, 34, 0, 0],
    longitudeSine: [524, -149, -35, 117, 151, 122, -71, -62, 0, 0],
  },
  'earth-moon': {
    semiMajorAxisAu: [1.0000010178, 0, 0],
    longitude: [100.46645683, 1295977422.83429, -2.04411],
    eccentricity: [0.0167086342, -0.0004203654, -1.26734e-5],
    perihelion: [102.93734808, 11612.3529, 53.27577],
    inclination: [0, 469.97289, -3.35053],
    node: [174.87317577, -8679.27034, 15.34191],
    axisMultiples: [16002, 21863, 32004, 10931, 14529, 16368, 15318, 32794, 0],
    axisCosine: [64, -152, 62, -8, 32, -41, 19, -11, 0],
    axisSine: [-150, -46, 68, 54, 14, 24, -28, 22, 0],
    longitudeMultiples: [10, 16002, 21863, 10931, 1473, 32004, 4387, 73, 0, 0],
    longitudeCosine: [-325, -322, -79, 232, -52, 97, 55, -41, 0, 0],
    longitudeSine: [-105, -137, 258, 35, -116, -88, -112, -80, 0, 0],
  },
  'mars': {
    semiMajorAxisAu: [1.5236793419, 3e-10, 0],
    longitude: [355.43299958, 689050774.93988, 0.94264],
    eccentricity: [0.0934006477, 0.0009048438, -8.0641e-6],
    perihelion: [336.06023395, 15980.45908, -62.328],
    inclination: [1.84972648, -293.31722, -8.1183],
    node: [49.55809321, -10620.90088, -230.57416],
    axisMultiples: [6345, 7818, 15636, 7077, 8184, 14163, 1107, 4872, 0],
    axisCosine: [124, 621, -145, 208, 54, -57, 30, 15, 0],
    axisSine: [-621, 532, -694, -20, 192, -94, 71, -73, 0],
    longitudeMultiples: [10, 6345, 7818, 1107, 15636, 7077, 8184, 532, 10, 0],
    longitudeCosine: [2268, -979, 802, 602, -668, -33, 345, 201, -55, 0],
    longitudeSine: [854, -205, -936, -240, 140, -341, -97, -232, 536, 0],
  },
  'jupiter': {
    semiMajorAxisAu: [5.2026032092, 1.9132e-6, -3.9e-9],
    longitude: [34.35151874, 109256603.77991, -30.60378],
    eccentricity: [0.0484979255, 0.0016322542, -4.71366e-5],
    perihelion: [14.33120687, 7758.75163, 259.95938],
    inclination: [1.30326698, -71.5589, 11.95297],
    node: [100.46440702, 6362.03561, 326.52178],
    axisMultiples: [1760, 1454, 1167, 880, 287, 2640, 19, 2047, 1454],
    axisCosine: [-23437, -2634, 6601, 6259, -1507, -1821, 2620, -2115, -1489],
    axisSine: [-14614, -19828, -5869, 1881, -4372, -2255, 782, 930, 913],
    longitudeMultiples: [19, 1760, 1454, 287, 1167, 880, 574, 2640, 19, 1454],
    longitudeCosine: [7610, -4997, -7689, -5841, -2617, 1115, -748, -607, 6074, 354],
    longitudeSine: [-56980, 8016, 1012, 1448, -3024, -3710, 318, 503, 3767, 577],
  },
  'saturn': {
    semiMajorAxisAu: [9.5549091915, -2.13896e-5, 4.44e-8],
    longitude: [50.0774443, 43996098.55732, 75.61614],
    eccentricity: [0.0555481426, -0.0034664062, -6.43639e-5],
    perihelion: [93.05723748, 20395.49439, 190.25952],
    inclination: [2.48887878, 91.85195, -17.66225],
    node: [113.66550252, -9240.19942, -66.23743],
    axisMultiples: [574, 0, 880, 287, 19, 1760, 1167, 306, 574],
    axisCosine: [62911, -119919, 79336, 17814, -24241, 12068, 8306, -4893, 8902],
    axisSine: [139737, 0, 24667, 51123, -5102, 7429, -4095, -1976, -9566],
    longitudeMultiples: [19, 574, 287, 306, 1760, 12, 31, 38, 19, 574],
    longitudeCosine: [-18549, 30125, 20012, -730, 824, 23, 1289, -352, -14767, -2062],
    longitudeSine: [138606, -13478, -4964, 1441, -1319, -1482, 427, 1236, -9167, -1918],
  },
  'uranus': {
    semiMajorAxisAu: [19.2184460618, -3.716e-7, 9.79e-8],
    longitude: [314.05500511, 15424811.93933, -1.75083],
    eccentricity: [0.0463812221, -0.0002729293, 7.8913e-6],
    perihelion: [173.00529106, 3215.56238, -34.09288],
    inclination: [0.77319689, -60.72723, 1.25759],
    node: [74.00595701, 2669.15033, 145.93964],
    axisMultiples: [204, 0, 177, 1265, 4, 385, 200, 208, 204],
    axisCosine: [389061, -262125, -44088, 8387, -22976, -2093, -615, -9720, 6633],
    axisSine: [-138081, 0, 37205, -49039, -41901, -33872, -27037, -12474, 18797],
    longitudeMultiples: [4, 204, 177, 8, 31, 200, 1265, 102, 4, 204],
    longitudeCosine: [-135245, -14594, 4197, -4030, -5630, -2898, 2540, -306, 2939, 1986],
    longitudeSine: [71234, -41116, 5334, -4935, -1848, 66, 434, -1748, 3780, -701],
  },
  'neptune': {
    semiMajorAxisAu: [30.1103868694, -1.6635e-6, 6.86e-8],
    longitude: [304.34866548, 7865503.20744, 0.21103],
    eccentricity: [0.009455747, 6.03263e-5, 0],
    perihelion: [48.12027554, 1050.71912, 27.39717],
    inclination: [1.76995259, 8.12333, 0.08135],
    node: [131.78405702, -221.94322, -0.78728],
    axisMultiples: [0, 102, 106, 4, 98, 1367, 487, 204, 0],
    axisCosine: [-412235, -157046, -31430, 37817, -9740, -13, -7449, 9644, 0],
    axisSine: [0, 28492, 133236, 69654, 52322, -49577, -26430, -3593, 0],
    longitudeMultiples: [4, 102, 106, 8, 98, 1367, 487, 204, 4, 102],
    longitudeCosine: [89948, 2103, 8963, 2695, 3682, 1648, 866, -154, -1963, -283],
    longitudeSine: [-47645, 11647, 2166, 3194, 679, 0, -244, -419, -2531, 48],
  },
}
