/** Version of the numerical core, stored with every analysis; raised whenever a figure may change. */
export const ENGINE_VERSION = '0.1.0'

/** Mean sidereal day in seconds of UT (Aoki et al. 1982, A&A 105, 359); worm period × teeth closes with it. */
export const SIDEREAL_DAY_SECONDS = 86164.0905

export const ARCSEC_PER_TURN = 1_296_000

/** Sidereal rate Ω = 1296000″ / 86164.0905 s = 15.0410686456″ per second of UT. */
export const SIDEREAL_RATE_ARCSEC_PER_SECOND = ARCSEC_PER_TURN / SIDEREAL_DAY_SECONDS

/** Arc seconds per radian in thousandths, 648000/π/1000: image scale = this · pixel size [µm] · binning / focal length [mm]. */
export const IMAGE_SCALE_FACTOR = 648 / Math.PI
