import { z } from "zod";

const Port = z
  .string()
  .regex(/^\d{1,5}$/)
  .transform(Number);
const Secret = z.string().min(24, "at least 24 characters");
const Origin = z.url().refine((text) => new URL(text).origin === text, "an origin without a path");

const Settings = z.object({
  PUBLIC_ORIGIN: Origin,
  DB_HOST: z.string().min(1),
  DB_PORT: Port,
  DB_NAME: z.string().min(1),
  DB_USER: z.string().min(1),
  DB_PASSWORD: z.string().min(1),
  DB_POOL_MAX: Port.default(10),
  OIDC_ISSUER: Origin,
  OIDC_CLIENT_ID: z.string().min(1),
  OIDC_CLIENT_SECRET: Secret,
  SMTP_HOST: z.string().min(1),
  SMTP_PORT: Port,
  MAIL_FROM: z.string().min(3),
  WORKER_TOKEN: Secret,
  DEV_PAGES: z.enum(["0", "1"]).default("0"),
  LOG_LEVEL: z.enum(["silent", "error", "warn", "info", "debug"]).default("info"),
});

function isLoopback(origin: string) {
  return ["127.0.0.1", "localhost", "[::1]"].includes(new URL(origin).hostname);
}

function readSettings() {
  const parsed = Settings.safeParse(process.env);
  if (!parsed.success) {
    const lines = parsed.error.issues.map((issue) => `  ${issue.path.join(".")}: ${issue.message}`);
    throw new Error(`Settings are missing or wrong:\n${lines.join("\n")}`);
  }
  const settings = parsed.data;
  const isSecure = settings.PUBLIC_ORIGIN.startsWith("https://");
  if (!isSecure && !isLoopback(settings.PUBLIC_ORIGIN)) {
    throw new Error("PUBLIC_ORIGIN must be https unless it is this machine itself.");
  }
  if (!settings.OIDC_ISSUER.startsWith("https://") && !isLoopback(settings.OIDC_ISSUER)) {
    throw new Error("OIDC_ISSUER must be https unless it is this machine itself: its keys decide who is let in.");
  }
  return Object.freeze({
    publicOrigin: settings.PUBLIC_ORIGIN,
    isSecure,
    db: {
      host: settings.DB_HOST,
      port: settings.DB_PORT,
      name: settings.DB_NAME,
      user: settings.DB_USER,
      password: settings.DB_PASSWORD,
      poolMax: settings.DB_POOL_MAX,
    },
    oidc: {
      issuer: settings.OIDC_ISSUER,
      clientId: settings.OIDC_CLIENT_ID,
      clientSecret: settings.OIDC_CLIENT_SECRET,
    },
    smtp: { host: settings.SMTP_HOST, port: settings.SMTP_PORT, from: settings.MAIL_FROM },
    workerToken: settings.WORKER_TOKEN,
    devPages: settings.DEV_PAGES === "1",
    logLevel: settings.LOG_LEVEL,
  });
}

/** Every setting, checked once at start; a missing one stops the start with all missing names. */
export const env = readSettings();
