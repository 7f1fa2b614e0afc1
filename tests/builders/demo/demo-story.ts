import type { Context } from '../../../server/context/context'
import type { TargetView } from '../../../shared/schemas/targets'
import type { FakeClock } from '../fake-clock'
import { addCast, demoSignIns } from './cast'
import type { DemoCast, DemoSignIn } from './cast'
import { tellEarth } from './earth'
import { tellHazel3Ac } from './hazel-3-ac'
import { tellIlmenau4 } from './ilmenau-4'
import { tellLinden12 } from './linden-12'
import { tellHazel3, tellLinden7 } from './waiting-pairs'

export const STORY_BEGINS = '2026-01-02T09:00:00.000Z'

export interface DemoHouse {
  /** An empty house, as nobody. */
  ctx: Context
  /** The clock of that context. */
  clock: FakeClock
}

export interface Demo {
  signIns: DemoSignIn[]
  cast: DemoCast
  linden12: TargetView
  earth: TargetView
  ilmenau4: TargetView
  hazel3Ac: TargetView
  linden7: TargetView
  hazel3: TargetView
}

/**
 * Fills an empty house with an invented group and its work of one winter, everything through the services. The clock is the
 * story's own; letters stay in the outbox for the server that is started upon it.
 * @param passwords one a person, at least as many as `demoSignIns` asks for
 */
export async function fillDemo({ house, passwords }: { house: DemoHouse, passwords: readonly string[] }): Promise<Demo> {
  const signIns = demoSignIns(passwords)
  house.clock.set(STORY_BEGINS)
  const cast = await addCast(house, signIns)
  const earth = await tellEarth(cast, house.clock)
  const linden12 = await tellLinden12(cast, house.clock)
  const ilmenau4 = await tellIlmenau4(cast, house.clock)
  const hazel3Ac = await tellHazel3Ac(cast, house.clock)
  const linden7 = await tellLinden7(cast, house.clock)
  const hazel3 = await tellHazel3(cast, house.clock)
  return { signIns, cast, linden12, earth, ilmenau4, hazel3Ac, linden7, hazel3 }
}
