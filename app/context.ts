import { createContext, type RouterContextProvider } from "react-router";

export const roles = ["recorder", "director", "coordinator", "analyst"] as const;
export type Role = (typeof roles)[number];

type Person = { userId: number; name: string; requestId: string; sessionId: number | null };

/** Someone who acts for one town, and can reach no other. */
export type TownActor = Person & { kind: "town"; role: "recorder" | "director"; townId: number; townName: string };
/** The network's coordinator. Has no town of its own. */
export type NetworkActor = Person & { kind: "network"; role: "coordinator" };
/** Reads editions, never a town's figures. */
export type AnalystActor = Person & { kind: "analyst"; role: "analyst" };
/** The queue runner, known by its token. */
export type WorkerActor = { kind: "worker"; role: "worker"; requestId: string };

export type PersonActor = TownActor | NetworkActor | AnalystActor;
export type Actor = PersonActor | WorkerActor;

/** Set by the root middleware on every page that is not public; reading it on a public page throws. */
export const actorContext = createContext<Actor>();
/** The person signed in, if any; set on every request. For the frame of the page, never for a decision. */
export const visitorContext = createContext<PersonActor | null>();
/** One per response, for the content security policy. */
export const nonceContext = createContext<string>();
/**
 * Names this request in the log, the audit trail and on error pages. Given by the root middleware; the framework refuses
 * some requests before that, and they are written down without a name.
 */
export const requestIdContext = createContext<string>("none");

type Context = Readonly<Pick<RouterContextProvider, "get">>;

/** @throws Error when the access table let another kind of actor through: a bug, never a visitor's fault */
export function townActor(context: Context): TownActor {
  const actor = context.get(actorContext);
  if (actor.kind !== "town") throw new Error(`This page needs a town's actor, not a ${actor.kind}'s.`);
  return actor;
}

/** @throws Error as townActor */
export function networkActor(context: Context): NetworkActor {
  const actor = context.get(actorContext);
  if (actor.kind !== "network") throw new Error(`This page needs the coordinator, not a ${actor.kind}.`);
  return actor;
}

/** @throws Error as townActor */
export function analystActor(context: Context): AnalystActor {
  const actor = context.get(actorContext);
  if (actor.kind !== "analyst") throw new Error(`This page needs an analyst, not a ${actor.kind}.`);
  return actor;
}

/** @throws Error as townActor */
export function personActor(context: Context): PersonActor {
  const actor = context.get(actorContext);
  if (actor.kind === "worker") throw new Error("This page needs a person, not the worker.");
  return actor;
}
