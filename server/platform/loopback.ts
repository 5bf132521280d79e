/** True for host names that never leave this machine, as they stand in a URL. */
export function isLoopback(hostname: string): boolean {
  return (
    hostname === 'localhost' ||
    hostname === '[::1]' ||
    hostname === '::1' ||
    /^127\.\d+\.\d+\.\d+$/.test(hostname)
  )
}
