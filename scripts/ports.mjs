import net from "node:net";
import { Problem } from "./say.mjs";

/** Whether nothing listens on a loopback port, tried by listening on it for a moment. */
export function isFree(port, host = "127.0.0.1") {
  return new Promise((resolve) => {
    const probe = net.createServer();
    probe.once("error", () => resolve(false));
    probe.listen({ port, host, exclusive: true }, () => probe.close(() => resolve(true)));
  });
}

/** The port that a variable names, or its default. */
export function portFrom(variable, fallback, environment = process.env) {
  const text = environment[variable];
  if (text === undefined || text === "") return fallback;
  const port = Number(text);
  if (!Number.isInteger(port) || port < 1 || port > 65535) {
    throw new Problem(`${variable} is "${text}". It must be a port: a whole number from 1 to 65535.`);
  }
  return port;
}

export async function mustBeFree(port, variable, what, host) {
  if (await isFree(port, host)) return;
  throw new Problem(
    `Port ${port} for ${what} is taken by another program (or by a Valvekeeper that is still running).\n` +
      `Stop that program, or choose another port: ${variable}=${port + 1} npm start`,
  );
}

/** The wanted port or, when it is taken, the next free one. For runs that nobody has to find. */
export async function freeFrom(port) {
  for (let candidate = port; candidate < port + 200; candidate += 1) if (await isFree(candidate)) return candidate;
  throw new Problem(`No free port between ${port} and ${port + 200}.`);
}
