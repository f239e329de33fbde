/** Where the server under test is; a request that changes something has to name it as the page's origin. */
export const SERVER_ORIGIN = new URL(process.env.E2E_BASE_URL ?? 'http://localhost:3000').origin
