import { afterEach, beforeEach, expect, test, vi } from "vitest";

const settings = {
  PUBLIC_ORIGIN: "https://network.example",
  DB_HOST: "127.0.0.1",
  DB_PORT: "3306",
  DB_NAME: "network",
  DB_USER: "app",
  DB_PASSWORD: "a-password",
  OIDC_ISSUER: "https://people.example",
  OIDC_CLIENT_ID: "network",
  OIDC_CLIENT_SECRET: "a-secret-of-at-least-24-characters",
  SMTP_HOST: "127.0.0.1",
  SMTP_PORT: "25",
  MAIL_FROM: "network@network.example",
  WORKER_TOKEN: "a-token-of-at-least-24-characters",
};

/** The settings as the program reads them at its start. */
async function readWith(changes: Partial<typeof settings>) {
  for (const [name, value] of Object.entries({ ...settings, ...changes })) vi.stubEnv(name, value);
  return (await import("#app/lib/env.server.ts")).env;
}

beforeEach(() => vi.resetModules());
afterEach(() => vi.unstubAllEnvs());

test("the program starts with addresses that are https, or on this machine", async () => {
  expect((await readWith({})).isSecure).toBe(true);
  vi.resetModules();
  const local = { PUBLIC_ORIGIN: "http://127.0.0.1:3000", OIDC_ISSUER: "http://localhost:4000" };
  expect((await readWith(local)).isSecure).toBe(false);
});

test.each([
  [{ PUBLIC_ORIGIN: "http://network.example" }, "PUBLIC_ORIGIN must be https"],
  [{ OIDC_ISSUER: "http://people.example" }, "OIDC_ISSUER must be https"],
  [{ OIDC_ISSUER: "https://people.example/realm" }, "OIDC_ISSUER"],
  [{ WORKER_TOKEN: "short" }, "WORKER_TOKEN"],
])("it does not start with %o", async (changes, reason) => {
  await expect(readWith(changes)).rejects.toThrow(reason);
});
