import { describe, expect, test } from 'vitest'
import { numberText, parseNumberText } from '@/components/ui/number-text'

describe('parseNumberText', () => {
  test.each([
    ['152', 152],
    ['566.87', 566.87],
    ['566,87', 566.87],
    ['\u22123.5', -3.5],
    ['+2', 2],
    ['10 000', 10_000],
    ['1e-3', 0.001],
    ['.5', 0.5],
    ['5.', 5],
  ])('reads %s as %f', (text, value) => {
    expect(parseNumberText(text)).toBe(value)
  })

  test.each(['', '   ', '\u2009'])('an empty field (%j) is no number', (text) => {
    expect(parseNumberText(text)).toBeNull()
  })

  test.each(['abc', '1.2.3', '1,234,567', '--1', '1e999', 'Infinity', 'NaN', '0x10', '12 s'])('refuses %s', (text) => {
    expect(parseNumberText(text)).toBe('not-a-number')
  })

  test.each([0, -1.5, 566.8690164474, 1e-9, 123456789])('numberText(%f) reads back as the same number', (value) => {
    expect(parseNumberText(numberText(value))).toBe(value)
  })
})
