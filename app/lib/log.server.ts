import pino from "pino";
import { env } from "./env.server.ts";

/** JSON lines to standard output: ids and events, never bodies, tokens, cookies, addresses or figures. */
export const log = pino({ level: env.logLevel, base: null, timestamp: pino.stdTimeFunctions.isoTime });
