// Stands in for Next.js's marker package, which refuses to load outside a server bundle.
export {}
