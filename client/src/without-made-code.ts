import { z } from 'zod'

// The page's security policy forbids making code from text, which zod would otherwise try as soon as a schema is used.
// The first import of the page, since other modules use schemas while they load.
z.config({ jitless: true })
