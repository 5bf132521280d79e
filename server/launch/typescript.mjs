import { register } from 'tsx/esm/api'

// For `node --import`: TypeScript in this thread. Worker threads inherit the flag and register for themselves, which
// `--import tsx` leaves out.
register()
