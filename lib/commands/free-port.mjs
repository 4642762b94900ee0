import { createServer } from "node:net";

/**
 * `wanted` when it is free on `host`, else any free port.
 * @param {string} host
 * @param {number} [wanted]
 * @returns {Promise<number>}
 */
export function freePort(host, wanted = 0) {
  return new Promise((resolve, reject) => {
    const probe = createServer();
    probe.once("error", (error) => (wanted === 0 ? reject(error) : resolve(freePort(host))));
    probe.listen({ host, port: wanted, exclusive: true }, () => {
      const address = probe.address();
      const port = typeof address === "object" && address ? address.port : wanted;
      probe.close(() => resolve(port));
    });
  });
}
