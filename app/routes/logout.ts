import { redirectDocument } from "react-router";
import { sessionCookie } from "#app/lib/cookies.server.ts";
import { signOutAddress } from "#app/services/sign-in.server.ts";
import { endSession } from "#app/services/sessions.server.ts";
import type { Route } from "./+types/logout";

export function loader() {
  return redirectDocument("/");
}

/** End the session here first: it must work with the sign-in service away. */
export async function action({ request }: Route.ActionArgs) {
  const token: unknown = await sessionCookie.parse(request.headers.get("cookie"));
  if (typeof token === "string") await endSession(token);
  const headers = { "Set-Cookie": await sessionCookie.serialize("", { maxAge: 0 }) };
  return redirectDocument((await signOutAddress()) ?? "/", { headers });
}
