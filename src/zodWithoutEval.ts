import { config } from 'zod'

/**
 * Zod builds faster parsers with `new Function`, which the Content-Security-Policy forbids; trying it alone is reported
 * as a violation. Bundled with zod itself (vite.config.ts), so that this runs before the first schema is made.
 */
config({ jitless: true })
