import { axisArcsecConversion, simulationOptions, type SimulationOptions } from '@/lib/simulate/options'
import { fileLayout, simulateFile, type FileLayout } from '@/lib/simulate/simulate-file'
import { simulateRun } from '@/lib/simulate/simulate-run'

/** Five turns of an invented mount with 180 teeth, as a file, with what is really in it. */
export function recording(given: Partial<SimulationOptions> = {}, layout: Partial<FileLayout> = {}) {
  const run = simulateRun(
    simulationOptions({
      wheelTeeth: 180,
      harmonics: [
        { order: 1, amplitudeArcsec: 9, phaseDegrees: 77 },
        { order: 2, amplitudeArcsec: 1.6, phaseDegrees: 210 },
      ],
      driftCoefficients: [0.012],
      seeing: { whiteSkyArcsec: 0.25, correlatedSkyArcsec: 0.25, correlationSeconds: 5 },
      cadenceSeconds: 3,
      durationSeconds: 2400,
      conversion: axisArcsecConversion(2),
      seed: 20261201,
      ...given,
    }),
  )
  const { text } = simulateFile(run, fileLayout({ displacementDecimals: 4, ...layout }))
  return { run, text }
}
