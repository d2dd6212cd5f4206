import { redirect } from "react-router";
import { startSignIn } from "#app/services/sign-in.server.ts";
import type { Route } from "./+types/auth.start";

/** Where every sign-in begins: a link, so that it also works from a mail or a terminal. */
export async function loader({ request, url }: Route.LoaderArgs) {
  const started = await startSignIn(request, {
    returnTo: url.searchParams.get("returnTo"),
    invitationHash: null,
    hint: url.searchParams.get("hint"),
  });
  return started ?? redirect("/login?problem=provider-away");
}
