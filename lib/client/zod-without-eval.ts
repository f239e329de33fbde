import { z } from 'zod'

// The Content-Security-Policy forbids eval, with which zod would compile its object parsers.
z.config({ jitless: true })
