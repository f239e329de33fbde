import { describe, expect, test } from 'vitest'
import { axisArcsecConversion, simulationOptions } from '@/lib/simulate/options'
import { fileLayout, simulateFile } from '@/lib/simulate/simulate-file'
import { simulateRun } from '@/lib/simulate/simulate-run'

const run = simulateRun(
  simulationOptions({
    wheelTeeth: 180,
    harmonics: [{ order: 1, amplitudeArcsec: 9, phaseDegrees: 180 }],
    cadenceSeconds: 0.5,
    durationSeconds: 1.5,
    conversion: axisArcsecConversion(),
    missingCells: [{ atSeconds: 1 }],
    wormAngleQuantumDegrees: 0.25,
  }),
)
// −9 cos(2πt/478.689…): at t = 0.5 s the angle is 0.0065629 rad, so −9(1 − 2.15357e-5) = −8.999806; at 1.5 s −8.998256.

describe('simulateFile', () => {
  test('writes comma and point with a header', () => {
    expect(simulateFile(run, fileLayout({ displacementDecimals: 6 })).text).toBe(
      [
        'Time,RA displacement,Worm angle',
        '0.000,-9.000000,0.00',
        '0.500,-8.999806,0.50',
        '1.000,,0.75',
        '1.500,-8.998256,1.25',
        '',
      ].join('\n'),
    )
  })

  test('writes semicolon and decimal comma, ISO 8601, units row, preamble, carriage returns', () => {
    const layout = fileLayout({
      delimiter: ';',
      decimalMark: ',',
      timeUnit: 'iso-8601',
      startedAtMs: Date.UTC(2026, 9, 3, 20, 59, 59, 500),
      preamble: ['# a line', '# and another'],
      hasUnits: true,
      lineEnd: '\r\n',
    })
    const file = simulateFile(run, layout)
    const lines = file.text.split('\r\n')
    expect(lines).toHaveLength(9)
    expect(lines[2]).toBe('Time;RA displacement;Worm angle')
    expect(lines[3]).toBe('UTC;arcsec;deg')
    expect(lines[5]).toBe('2026-10-03T21:00:00.000Z;-9,000;0,50')
    expect(file.importSettings.layout).toEqual({
      encoding: 'utf-8',
      delimiter: ';',
      decimalMark: ',',
      headerRow: 3,
      unitsRow: 4,
      firstDataRow: 5,
    })
    expect(file.importSettings.columns).toEqual({
      time: 0,
      timeUnit: 'iso-8601',
      displacement: 1,
      displacementUnit: 'arcsec',
      declination: null,
      wormAngle: 2,
      wormAngleUnit: 'degrees',
    })
  })

  test('writes tabs, no header, Julian Dates: 2000 January 1.5 is 2451545.0 (Meeus 1998, chapter 7)', () => {
    const layout = fileLayout({
      delimiter: '\t',
      timeUnit: 'julian-date',
      startedAtMs: Date.UTC(2000, 0, 1, 12),
      hasHeader: false,
    })
    const file = simulateFile(run, layout)
    expect(file.text.split('\n')[0]).toBe('2451545.00000000\t-9.000\t0.00')
    expect(file.importSettings.layout).toMatchObject({ headerRow: null, unitsRow: null, firstDataRow: 1 })
  })

  test('writes minutes and milliseconds', () => {
    const lastTime = (timeUnit: 'minutes' | 'milliseconds') =>
      simulateFile(run, fileLayout({ timeUnit })).text.trim().split('\n').at(-1)!.split(',')[0]
    expect(lastTime('minutes')).toBe('0.02500')
    expect(lastTime('milliseconds')).toBe('1500')
  })

  test('refuses what cannot be read again', () => {
    expect(() => simulateFile(run, fileLayout({ decimalMark: ',' }))).toThrow(RangeError)
    expect(() => simulateFile(run, fileLayout({ timeUnit: 'julian-date' }))).toThrow('startedAtMs')
  })
})
