import { createCookie } from "react-router";
import { env } from "./env.server.ts";

/** Carries the session's random token; the database holds only its hash. */
export const sessionCookie = createCookie(env.isSecure ? "__Host-sid" : "sid", {
  httpOnly: true,
  secure: env.isSecure,
  sameSite: "lax",
  path: "/",
});
