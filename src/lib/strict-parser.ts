import { z } from 'zod'

// The content security policy forbids code made from text, which zod would otherwise try for speed.
z.config({ jitless: true })
