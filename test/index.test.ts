import { expect, test } from 'vitest'
import * as library from '../src/index.ts'

test('the public names of the library', () => {
  expect(Object.keys(library).sort()).toEqual([
    'calculationJson',
    'digestOf',
    'prepareSheet',
    'programVersion',
    'stableJson',
    'valuesText',
  ])
})
