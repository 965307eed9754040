import { expect, test } from 'vitest'
import * as library from '../src/index.ts'

test('the public names of the library', () => {
  expect(Object.keys(library).sort()).toEqual([
    'calculationJson',
    'digestOf',
    'htmlDocument',
    'pdfJob',
    'prepareSheet',
    'printPdf',
    'programVersion',
    'stableJson',
    'valuesText',
  ])
})

const SHEET = '---\nsheet: T-1\ntitle: Trial\n---\n```check\n1 m <= 2 m\n```\n'

test('a program can check, print and list a sheet with them', () => {
  const prepared = library.prepareSheet({ path: 't.md', text: SHEET })
  const calculation = prepared.calculation ?? expect.fail('not calculated')
  expect(prepared.verdict).toBe('pass')
  expect(library.valuesText(calculation)).toBe('check 1 m <= 2 m: 1 m against 2 m 0.500 OK\n')
  expect(library.stableJson(library.calculationJson(prepared))).toContain(library.digestOf(calculation))
  expect(library.htmlDocument(prepared).html).toMatch(/^<!doctype html>/)
  expect(library.pdfJob(prepared, { paper: 'Letter' }).metadata).toMatchObject({
    title: 'T-1 Trial',
    language: 'en',
    keywords: [library.digestOf(calculation)],
  })
})

test('a sheet that could not be calculated has no document', () => {
  const prepared = library.prepareSheet({ path: 't.md', text: SHEET.replace('2 m', '2 s') })
  expect(() => library.htmlDocument(prepared)).toThrow('`t.md` could not be calculated, and has no document')
})
