import { expect, test } from 'vitest'
import { numberedFolder, safeFileName } from '@/lib/formats/archive-names'

test.each([
  ['night.csv', 'night.csv'],
  ['Größe 1.csv', 'Größe 1.csv'],
  ['CON', '_CON'],
  ['con.csv', '_con.csv'],
  ['Lpt9.tar.gz', '_Lpt9.tar.gz'],
  ['console.csv', 'console.csv'],
  ['a/b\\c:d.csv', 'a_b_c_d.csv'],
  ['..', 'file'],
  ['', 'file'],
  ['trailing. . ', 'trailing'],
  ['a\u202ecsv.exe', 'a_csv.exe'],
  ['👩‍🚀.csv', '👩‍🚀.csv'],
])('safeFileName(%j) = %j', (name, safe) => {
  expect(safeFileName(name)).toBe(safe)
})

test('safeFileName keeps the ending of a long name and cuts no character in two', () => {
  const safe = safeFileName(`${'👩‍🚀'.repeat(60)}.csv`)
  expect(new TextEncoder().encode(safe).length).toBeLessThanOrEqual(80)
  expect(safe).toMatch(/^(👩‍🚀)+\.csv$/u)
})

test.each([
  [0, 3, 'First light', '001-First-light'],
  [999, 1200, 'a / b', '1000-a-b'],
  [0, 20_000, 'x', '00001-x'],
  [1, 2, '???', '002'],
  [1, 2, '../..', '002'],
  [1, 2, 'v1.', '002-v1'],
])('numberedFolder(%i, %i, %j) = %j', (index, count, name, folder) => {
  expect(numberedFolder(index, count, name)).toBe(folder)
})
