import { expect, test } from 'vitest'
import { BoundedMemory } from '../../../server/services/boundedMemory.js'

test('what was not asked for longest makes room', () => {
  const memory = new BoundedMemory<number>(2)
  memory.keep('a', 1)
  memory.keep('b', 2)
  expect(memory.get('a')).toBe(1)
  memory.keep('c', 3)
  expect([memory.get('a'), memory.get('b'), memory.get('c')]).toEqual([1, undefined, 3])
})

test('keeping a key again replaces its value and takes no second place', () => {
  const memory = new BoundedMemory<number>(2)
  memory.keep('a', 1)
  memory.keep('b', 2)
  expect(memory.keep('a', 4)).toBe(4)
  expect([memory.get('a'), memory.get('b')]).toEqual([4, 2])
})
