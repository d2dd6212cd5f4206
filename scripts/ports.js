import { randomInt } from "node:crypto";
import { createServer } from "node:net";
import { Failure } from "./failures.js";

/**
 * The four ports of a running network: the application's, and the three that follow it.
 *
 * @param {string | undefined} wanted the PORT setting; 4310 when not given
 * @returns {{ app: number, idp: number, mailPage: number, smtp: number }}
 * @throws {Failure} when PORT is no port number that leaves room for three more
 * @example portsFrom("5000") // { app: 5000, idp: 5001, mailPage: 5002, smtp: 5003 }
 */
export function portsFrom(wanted) {
  const app = wanted === undefined || wanted === "" ? 4310 : Number(wanted);
  if (!Number.isInteger(app) || app < 1 || app > 65_532) {
    throw new Failure(
      `PORT is "${wanted}", which is no port. Give a whole number from 1024 to 65532: PORT=4400 npm start`,
    );
  }
  return { app, idp: app + 1, mailPage: app + 2, smtp: app + 3 };
}

/** A port on loopback that nobody uses at this moment. */
export async function freePort() {
  return listenOnce(0);
}

/**
 * Four neighbouring free ports, for tests that run a network of their own beside another.
 *
 * @returns {Promise<{ app: number, idp: number, mailPage: number, smtp: number }>}
 */
export async function freePorts() {
  for (let attempt = 0; attempt < 50; attempt += 1) {
    // Below the range that the kernel hands to outgoing connections: on a busy machine one of those would take a port
    // between the asking and the listening.
    const ports = portsFrom(String(randomInt(15_000, 32_000)));
    const taken = await takenPort(Object.values(ports));
    if (taken === null) return ports;
  }
  throw new Failure("No four neighbouring ports are free on this machine. Stop a few programs, then try again.");
}

/**
 * Refuse to go on while one of the ports belongs to another program.
 *
 * @param {{ app: number, idp: number, mailPage: number, smtp: number }} ports
 * @throws {Failure} naming the port and the way round it
 */
export async function assertPortsFree(ports) {
  const taken = await takenPort(Object.values(ports));
  if (taken === null) return;
  throw new Failure(
    `Port ${taken.port} ${taken.reason}. Stop that program, or start on other ports: PORT=${ports.app + 90} npm start`,
  );
}

/** @param {number[]} ports */
async function takenPort(ports) {
  for (const port of ports) {
    try {
      await listenOnce(port);
    } catch (error) {
      if (error.code === "EADDRINUSE") return { port, reason: "is taken by another program" };
      if (error.code === "EACCES") return { port, reason: "is reserved for the system" };
      throw error;
    }
  }
  return null;
}

/** @param {number} port @returns {Promise<number>} */
function listenOnce(port) {
  return new Promise((resolve, reject) => {
    const probe = createServer();
    probe.once("error", reject);
    probe.listen(port, "127.0.0.1", () => {
      const address = probe.address();
      const used = typeof address === "object" && address !== null ? address.port : port;
      probe.close(() => resolve(used));
    });
  });
}
