import { Form, redirect } from "react-router";
import { Answer, Method } from "#app/components/layout/answer.tsx";
import { Page } from "#app/components/layout/page.tsx";
import { Button } from "#app/components/ui/button.tsx";
import type { Role } from "#app/context.ts";
import { invitationGone } from "#app/lib/errors.ts";
import { getInvitation } from "#app/services/accounts.server.ts";
import { startSignIn } from "#app/services/sign-in.server.ts";
import type { Route } from "./+types/invitation";

const duties: Record<Role, string> = {
  recorder: "You calibrate trucks and put in the season’s figures.",
  director: "You compare your fleet with your peers, and send the season in.",
  coordinator: "You admit towns, review their figures, publish editions and run workshops.",
  analyst: "You download the protected dataset, by hand or by program.",
};

function tokenParam(text: string) {
  if (!/^[\w-]{43}$/.test(text)) throw invitationGone();
  return text;
}

export async function loader({ params }: Route.LoaderArgs) {
  const { name, role, townName } = await getInvitation(tokenParam(params.token));
  return { name, role, townName };
}

/** Opening the page does nothing: mail programs open links by themselves. */
export async function action({ params, request }: Route.ActionArgs) {
  const { tokenHash } = await getInvitation(tokenParam(params.token));
  const started = await startSignIn(request, { returnTo: "/today", invitationHash: tokenHash, hint: null });
  return started ?? redirect("/login?problem=provider-away");
}

// The address holds a secret; the Referrer-Policy header keeps it on this site. A stricter policy would make browsers
// send the form below as Origin: null, which is refused.
export const meta: Route.MetaFunction = () => [{ title: "Invitation · Commonweigh" }];

export default function Invitation({ loaderData: { name, role, townName } }: Route.ComponentProps) {
  const article = role === "analyst" ? "an" : "a";
  return (
    <Page hasBottomBar={false}>
      <Answer>
        {name}, you are invited as {townName === null ? `${article} ${role}` : `${role} of ${townName}`}.
      </Answer>
      <Method>{duties[role]} Accepting takes you to the sign-in service, and from there to your first page.</Method>
      <Form method="post" reloadDocument className="mt-6">
        <Button>Accept and sign in</Button>
      </Form>
    </Page>
  );
}
