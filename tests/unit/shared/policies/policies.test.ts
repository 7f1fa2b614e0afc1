import { expect, test } from 'vitest'
import { mayAdminister, mayReadEmail } from '../../../../shared/policies/administering'
import { hasDesk, mayCreateTarget, mayPublish, mayRequestFit, mayWithdrawEdition } from '../../../../shared/policies/coordinating'
import { mayReadBatch, mayReadDraftsAndRawFile, mayReadPublished, mayReadSentWork } from '../../../../shared/policies/reading'
import { isHinderedByOwnWork, mayRule } from '../../../../shared/policies/ruling'
import { mayChangeBatch, mayUpload } from '../../../../shared/policies/uploading'
import type { Actor } from '../../../../shared/schemas/people'

const actor = (personId: string, roles: Partial<Actor> = {}): Actor => ({ personId, isObserver: false, isAdministrator: false, coordinatorOf: [], ...roles })

const people: Record<string, Actor | null> = {
  visitor: null,
  member: actor('member'),
  observer: actor('observer', { isObserver: true }),
  otherObserver: actor('otherObserver', { isObserver: true }),
  coordinator: actor('coordinator', { coordinatorOf: ['pairs'] }),
  otherCoordinator: actor('otherCoordinator', { coordinatorOf: ['sun'] }),
  administrator: actor('administrator', { isAdministrator: true }),
}

function whoMay(isAllowed: (actor: Actor | null) => boolean): string[] {
  return Object.keys(people).filter(name => isAllowed(people[name] ?? null))
}

const draft = { ownerId: 'observer', isOpenToOthers: false, programmeIds: ['pairs'] }
const sent = { ...draft, isOpenToOthers: true }
const pairs = { programmeId: 'pairs' }
const everybodySignedIn = ['member', 'observer', 'otherObserver', 'coordinator', 'otherCoordinator', 'administrator']

test.each<[string, (actor: Actor | null) => boolean, string[]]>([
  ['what is published is read by everybody', mayReadPublished, ['visitor', ...everybodySignedIn]],
  ['sent work is read by every signed-in person', mayReadSentWork, everybodySignedIn],
  ['a draft batch is read by its owner alone', a => mayReadBatch(a, draft), ['observer']],
  ['a sent batch is read by every signed-in person', a => mayReadBatch(a, sent), everybodySignedIn],
  ['the raw file of a draft is read by its owner alone', a => mayReadDraftsAndRawFile(a, draft), ['observer']],
  ['the raw file of a sent batch is read by its owner and the coordinators of its programme', a => mayReadDraftsAndRawFile(a, sent), ['observer', 'coordinator']],
  ['observers upload', mayUpload, ['observer', 'otherObserver']],
  ['a batch is changed by its owner alone', a => mayChangeBatch(a, draft), ['observer']],
  ['targets are made by the coordinators of the programme', a => mayCreateTarget(a, pairs), ['coordinator']],
  ['fits are asked for by the coordinators of the programme', a => mayRequestFit(a, pairs), ['coordinator']],
  ['editions are published by the coordinators of the programme', a => mayPublish(a, pairs), ['coordinator']],
  ['editions are withdrawn by the coordinators of the programme', a => mayWithdrawEdition(a, pairs), ['coordinator']],
  ['coordinators of any programme have a desk', hasDesk, ['coordinator', 'otherCoordinator']],
  ['people and invitations are the administrator\'s', mayAdminister, ['administrator']],
  ['an e-mail address is read by oneself and the administrator', a => mayReadEmail(a, 'observer'), ['observer', 'administrator']],
])('%s', (_name, isAllowed, expected) => {
  expect(whoMay(isAllowed)).toEqual(expected)
})

const fit = { programmeId: 'pairs', newMeasuresOf: ['observer'], coordinatorIds: ['coordinator', 'second'] }

test('fits are ruled on by the coordinators of the programme', () => {
  expect(whoMay(a => mayRule(a, fit))).toEqual(['coordinator'])
})

test('a coordinator does not rule on her own work while another coordinator of the programme is active', () => {
  const own = { ...fit, newMeasuresOf: ['observer', 'coordinator'] }
  expect(mayRule(people.coordinator!, own)).toBe(false)
  expect(isHinderedByOwnWork(people.coordinator!, own)).toBe(true)
})

test('the only active coordinator may rule on her own work', () => {
  const own = { ...fit, newMeasuresOf: ['coordinator'], coordinatorIds: ['coordinator'] }
  expect(mayRule(people.coordinator!, own)).toBe(true)
})

test('own work does not hinder where ruling was not open in the first place', () => {
  expect(isHinderedByOwnWork(people.otherCoordinator!, { ...fit, newMeasuresOf: ['otherCoordinator'] })).toBe(false)
  expect(mayRule(people.otherCoordinator!, { ...fit, newMeasuresOf: ['otherCoordinator'] })).toBe(false)
})

test('an administrator who coordinates nothing does not rule', () => {
  expect(mayRule(people.administrator!, { ...fit, coordinatorIds: [] })).toBe(false)
})
