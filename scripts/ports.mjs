import { createServer } from "node:net";

/** Whether nobody listens on this port of the loopback address. Port 0 asks for any: the number given is returned, else null. */
function probe(port) {
  return new Promise((settle) => {
    const server = createServer();
    server.once("error", () => settle(null));
    server.listen({ port, host: "127.0.0.1", exclusive: true }, () => {
      const given = server.address().port;
      server.close(() => settle(given));
    });
  });
}

export const isPortFree = async (port) => (await probe(port)) !== null;

/** The first free port from `from` on, within `count`. */
export async function findFreePort(from, count = 50) {
  for (let port = from; port < from + count; port++) if (await isPortFree(port)) return port;
  throw new Error(`no free port from ${from} to ${from + count - 1}`);
}

/** Any free port, chosen by the system. */
export const findAnyPort = () => probe(0);
