import type { Register } from "react-router";
import type { Role } from "#app/context.ts";

type Page = keyof Register["pages"];
type Reader = Role | "worker";
/** By which door one comes: the session cookie, or the bearer token. Never both on one page. */
type Rule = "public" | { door: "session" | "token"; read: readonly Reader[]; write: readonly Reader[] };

const session = (read: readonly Role[], write: readonly Role[] = []): Rule => ({ door: "session", read, write });
const token = (read: readonly Reader[], write: readonly Reader[] = []): Rule => ({ door: "token", read, write });

const town = ["recorder", "director"] as const;
const everyone = ["recorder", "director", "coordinator", "analyst"] as const;

/** Who may open and who may change each page. A page without a line here does not compile. */
const access: Record<Page, Rule> = {
  "/": "public",
  "/protection": "public",
  "/login": "public",
  "/auth/start": "public",
  "/auth/callback": "public",
  "/logout": "public",
  "/invitations/:token": "public",
  "/healthz": "public",
  "/readyz": "public",
  "/components": "public",
  "/bare": "public",
  "/*": "public",

  "/today": session(everyone),
  "/account": session(everyone, everyone),

  "/fleet": session(town, ["director"]),
  "/fleet/trucks/new": session(town, town),
  "/fleet/due": session(town),
  "/fleet/cards": session(town),
  "/fleet/bands": session(town, ["director"]),
  "/fleet/export": session(town),
  "/fleet/calibrations/:calibrationId": session(town, ["director"]),
  "/fleet/calibrations/:calibrationId/card": session(town),
  "/fleet/worksheets": session(town),
  "/fleet/worksheets/kit": session(town),
  "/fleet/worksheets/sync": session([], town),
  // Holds no data of its own, so that a phone may keep it and open it without signal; what it shows is on the phone.
  "/fleet/worksheets/:clientRef": "public",
  "/fleet/:truckId": session(town),
  "/fleet/:truckId/edit": session(town, town),
  "/fleet/:truckId/work": session(town, town),
  "/season": session(town),
  "/season/:seasonStartYear": session(town, ["director"]),
  "/uploads": session(town, town),
  "/uploads/templates/:kind": session(town),
  "/uploads/:uploadId": session(town, town),
  "/uploads/:uploadId/columns": session(town, town),
  "/uploads/:uploadId/problems": session(town),
  "/uploads/:uploadId/file": session(town),
  "/peers": session(town),
  "/peers/table": session(town),

  "/workshops": session([...town, "coordinator"], ["coordinator"]),
  "/workshops/:workshopId": session(["coordinator"], ["coordinator"]),
  "/workshops/:workshopId/boards/:position": session(["coordinator"]),

  "/dataset": session(everyone, everyone),
  "/dataset/tokens": session(["analyst"], ["analyst"]),
  "/dataset/editions/:editionId/:file": session(everyone),

  "/network": session(["coordinator"]),
  "/network/review": session(["coordinator"], ["coordinator"]),
  "/network/review/:figureId": session(["coordinator"], ["coordinator"]),
  "/network/editions": session(["coordinator"], ["coordinator"]),
  "/network/bands": session(["coordinator"], ["coordinator"]),
  "/network/people": session(["coordinator"], ["coordinator"]),
  "/network/mail": session(["coordinator"]),
  "/network/audit": session(["coordinator"]),

  "/api/v1/editions": token(["analyst"]),
  "/api/v1/editions/:editionId/:file": token(["analyst"]),
  "/internal/tick": token([], ["worker"]),
};

export const rulesByPattern = new Map<string, Rule>(Object.entries(access));
