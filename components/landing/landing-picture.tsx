import { LandingSheet } from './landing-sheet'
import { samplePicture } from './sample-picture'

/** A real picture of the sample run, drawn on the server: no script is needed to see it. */
export async function LandingPicture() {
  return <LandingSheet picture={await samplePicture()} />
}
