/** Release of the calculations as a whole; it stands in every provenance line and in the signed record. */
export const ENGINE_VERSION = '1.0.0'
