import { describe, expect, it, vi } from 'vitest'
import { useMeasureWalk } from '../../../../app/composables/useMeasureWalk'

function press(key: string, chosen: string | null, modifiers: { ctrlKey?: boolean } = {}) {
  const choose = vi.fn()
  const preventDefault = vi.fn()
  useMeasureWalk(() => ['a', 'b', 'c'], () => chosen, choose).walk({ key, preventDefault, ctrlKey: false, metaKey: false, altKey: false, ...modifiers } as unknown as KeyboardEvent)
  return { choose, preventDefault }
}
const chosenAfter = (key: string, chosen: string | null) => press(key, chosen).choose.mock.calls[0]?.[0]

describe('walking through measures by keyboard', () => {
  it('steps forth and back and stops at the ends', () => {
    expect([chosenAfter('ArrowRight', 'a'), chosenAfter('ArrowDown', 'b'), chosenAfter('ArrowRight', 'c')]).toEqual(['b', 'c', 'c'])
    expect([chosenAfter('ArrowLeft', 'c'), chosenAfter('ArrowUp', 'a')]).toEqual(['b', 'a'])
  })

  it('begins at the near end where nothing is chosen', () => {
    expect([chosenAfter('ArrowRight', null), chosenAfter('ArrowLeft', null), chosenAfter('End', null), chosenAfter('Home', 'c')]).toEqual(['a', 'c', 'c', 'a'])
  })

  it('lets go on Escape', () => {
    expect(chosenAfter('Escape', 'b')).toBeNull()
  })

  it('leaves every other key, and keys with a modifier, to the browser', () => {
    for (const { choose, preventDefault } of [press('Tab', 'a'), press('x', 'a'), press('ArrowRight', 'a', { ctrlKey: true })]) {
      expect(choose).not.toHaveBeenCalled()
      expect(preventDefault).not.toHaveBeenCalled()
    }
  })
})
