import net from 'node:net'

/** A port of 127.0.0.1 that nobody uses at this moment. */
export function freePort() {
  return listening(0).then(async (server) => {
    const { port } = server.address()
    await new Promise((done) => server.close(done))
    return port
  })
}

export async function isFree(port) {
  try {
    const server = await listening(port)
    await new Promise((done) => server.close(done))
    return true
  } catch {
    return false
  }
}

function listening(port) {
  return new Promise((done, fail) => {
    const server = net.createServer()
    server.once('error', fail)
    server.listen(port, '127.0.0.1', () => done(server))
  })
}
