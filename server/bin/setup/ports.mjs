import { createServer } from 'node:net';
import { isErrno } from './process-identity.mjs';
import { SetupError } from './setup-error.mjs';

/**
 * A port nothing listens on at this moment.
 *
 * @param {string} host
 * @returns {Promise<number>}
 */
export function findFreePort(host = '127.0.0.1') {
  return listenOnce(0, host);
}

/**
 * Makes sure that the server will be able to listen.
 *
 * @param {number} port
 * @param {string} host
 * @param {number} patienceMs how long to wait for the port to become free
 * @throws {SetupError} saying what was found and what to do
 */
export async function checkPortFree(port, host, patienceMs = 0) {
  const deadline = Date.now() + patienceMs;
  for (;;) {
    try {
      await listenOnce(port, host);
      return;
    } catch (error) {
      if (isErrno(error, 'EADDRINUSE') && Date.now() < deadline) {
        await new Promise((wake) => setTimeout(wake, 200));
        continue;
      }
      throw describeListenFailure(error, port, host);
    }
  }
}

/**
 * @param {unknown} error
 * @param {number} port
 * @param {string} host
 */
function describeListenFailure(error, port, host) {
  if (isErrno(error, 'EADDRINUSE')) {
    return new SetupError(
      `Port ${port} on ${host} is taken by another program; wanted a free one. Stop that program, or choose another ` +
        `port: GROUNDSEL_PORT=${port < 65_535 ? port + 1 : port - 1} npm start`,
    );
  }
  if (isErrno(error, 'EACCES')) {
    return new SetupError(`This user may not listen on port ${port}; set GROUNDSEL_PORT to one above 1023.`);
  }
  if (isErrno(error, 'EADDRNOTAVAIL') || isErrno(error, 'ENOTFOUND')) {
    return new SetupError(`GROUNDSEL_HOST: ${host} is no address of this machine; wanted one, such as 127.0.0.1.`);
  }
  return error;
}

/**
 * @param {number} port
 * @param {string} host
 * @returns {Promise<number>}
 */
function listenOnce(port, host) {
  return new Promise((resolve, reject) => {
    const server = createServer();
    server.once('error', reject);
    server.listen({ port, host, exclusive: true }, () => {
      const address = server.address();
      const found = typeof address === 'object' && address !== null ? address.port : port;
      server.close(() => resolve(found));
    });
  });
}
