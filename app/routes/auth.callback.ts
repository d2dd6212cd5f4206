import { redirect } from "react-router";
import { sessionCookie } from "#app/lib/cookies.server.ts";
import { clearedAttemptCookies, finishSignIn } from "#app/services/sign-in.server.ts";
import { endSession } from "#app/services/sessions.server.ts";
import type { Route } from "./+types/auth.callback";

/** Where the sign-in service sends the browser back to. Any session from before ends here. */
export async function loader({ request }: Route.LoaderArgs) {
  const headers = new Headers();
  for (const line of clearedAttemptCookies(request)) headers.append("Set-Cookie", line);
  const outcome = await finishSignIn(request);
  if (!outcome.ok) return redirect(`/login?problem=${outcome.reason}`, { headers });
  const before: unknown = await sessionCookie.parse(request.headers.get("cookie"));
  if (typeof before === "string") await endSession(before);
  headers.append("Set-Cookie", await sessionCookie.serialize(outcome.sessionToken));
  return redirect(outcome.returnTo, { headers });
}
