import { z } from 'zod'

// The page's policy forbids making code from text. This module is imported first, before any schema is made.
z.config({ jitless: true })
