import { randomBytes } from "node:crypto";
import { mkdtemp, rm } from "node:fs/promises";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { startProgram, stopPrograms, waitUntilAnswering } from "#scripts/children.js";
import { freePort } from "#scripts/ports.js";
import { plainEnvironment, projectFolder } from "#scripts/settings.js";

/** The project's own sign-in service, as a program of its own. */
export type Idp = {
  issuer: string;
  clientSecret: string;
  /** Break its ID tokens in one way (see idp/faults.js), or take it down; null mends it. */
  setFault: (fault: string | null) => Promise<void>;
  stop: () => Promise<void>;
};

/** @param applicationOrigin - the only address it sends anybody back to */
export async function startIdp(applicationOrigin: string): Promise<Idp> {
  const folder = await mkdtemp(join(tmpdir(), "commonweigh-test-idp-"));
  const issuer = `http://127.0.0.1:${await freePort()}`;
  const clientSecret = randomBytes(32).toString("base64url");
  const program = startProgram({
    title: "identity provider",
    script: "idp/server.js",
    root: projectFolder,
    logFolder: folder,
    env: {
      ...plainEnvironment(),
      OIDC_ISSUER: issuer,
      PUBLIC_ORIGIN: applicationOrigin,
      OIDC_CLIENT_ID: "commonweigh",
      OIDC_CLIENT_SECRET: clientSecret,
      IDP_STATE_DIR: folder,
      IDP_DEMO_PEOPLE: "1",
      IDP_FAULTS: "1",
    },
  });
  await waitUntilAnswering(program, async () => (await fetch(`${issuer}/.well-known/openid-configuration`)).ok);
  return {
    issuer,
    clientSecret,
    setFault: async (fault) => {
      const answer = await fetch(`${issuer}/_fault`, { method: "POST", body: JSON.stringify({ fault }) });
      if (!answer.ok) throw new Error(`The sign-in service does not know the fault ${String(fault)}.`);
    },
    stop: async () => {
      await stopPrograms([program]);
      await rm(folder, { recursive: true, force: true });
    },
  };
}
