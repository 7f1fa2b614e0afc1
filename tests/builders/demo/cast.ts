import type { Context } from '../../../server/context/context'
import type { ProgrammeView } from '../../../shared/schemas/targets'
import { addFirstAdministrator, addPerson, addProgramme } from '../people'
import type { AddedPerson } from '../people'

/** The invented group. Nobody of these names is meant. */
const CAST = {
  keeper: { displayName: 'Elowen Karst', email: 'elowen@semilatus.example', role: 'administrator' },
  mirelle: { displayName: 'Mirelle Tasque', email: 'mirelle@semilatus.example', role: 'coordinator, all programmes' },
  sefa: { displayName: 'Sefa Marrowby', email: 'sefa@semilatus.example', role: 'coordinator, all programmes' },
  ossian: { displayName: 'Ossian Brandvik', email: 'ossian@semilatus.example', role: 'observer' },
  orrowin: { displayName: 'T. Orrowin', email: 'orrowin@semilatus.example', role: 'observer' },
  ilka: { displayName: 'Ilka Soundraven', email: 'ilka@semilatus.example', role: 'observer' },
  wenna: { displayName: 'Wenna Ashgrove', email: 'wenna@semilatus.example', role: 'member who follows two targets' },
} as const

export type CastName = keyof typeof CAST
export const CAST_NAMES = Object.keys(CAST) as CastName[]

/** What the demo prints of a person. */
export interface DemoSignIn {
  role: string
  name: string
  email: string
  password: string
}

export interface DemoCast {
  people: Record<CastName, AddedPerson>
  pairs: ProgrammeView
  sun: ProgrammeView
  comets: ProgrammeView
}

/** The sign-ins with these passwords, one a person, in the order of the cast. */
export function demoSignIns(passwords: readonly string[]): DemoSignIn[] {
  if (passwords.length < CAST_NAMES.length) throw new Error(`The demo has ${CAST_NAMES.length} people, and ${passwords.length} passwords were given.`)
  return CAST_NAMES.map((name, k) => ({ role: CAST[name].role, name: CAST[name].displayName, email: CAST[name].email, password: passwords[k]! }))
}

/** Invites everybody and makes the three programmes. */
export async function addCast(house: { ctx: Context }, signIns: readonly DemoSignIn[]): Promise<DemoCast> {
  const [keeperSignIn, ...others] = signIns
  const keeper = await addFirstAdministrator(house, { displayName: keeperSignIn!.name, email: keeperSignIn!.email, password: keeperSignIn!.password })
  const pairs = await addProgramme(house, {
    name: 'Northern pairs', leastMeasures: 12, leastObservers: 2, leastArcTurns: 0.3,
    description: 'Double stars north of the equator that a small telescope can split, measured year after year.',
  })
  const sun = await addProgramme(house, {
    name: 'Solar diameters 2025', leastMeasures: 24, leastObservers: 2,
    description: 'The shape of our own orbit from the apparent diameter of the Sun through one year, always behind a full-aperture filter.',
  })
  const comets = await addProgramme(house, {
    name: 'Bright comets', leastMeasures: 18, leastObservers: 2,
    description: 'Comets within reach of a small telescope, from the first evening to the last, each orbit published over the arc for which it is honest.',
  })
  const people: Partial<Record<CastName, AddedPerson>> = { keeper }
  for (const [k, signIn] of others.entries()) {
    const name = CAST_NAMES[k + 1]!
    people[name] = await addPerson(house, { displayName: signIn.name, email: signIn.email, password: signIn.password, ...rolesOf(name, [pairs.id, sun.id, comets.id]) })
  }
  return { people: people as Record<CastName, AddedPerson>, pairs, sun, comets }
}

function rolesOf(name: CastName, programmeIds: string[]): { isObserver?: boolean, coordinatorOf?: string[] } {
  if (name === 'mirelle' || name === 'sefa') return { coordinatorOf: programmeIds }
  return { isObserver: name !== 'wenna' }
}
