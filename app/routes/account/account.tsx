import { Form, redirect } from "react-router";
import { Answer, Heading, Method } from "#app/components/layout/answer.tsx";
import { Page } from "#app/components/layout/page.tsx";
import { Button } from "#app/components/ui/button.tsx";
import { Timetable } from "#app/components/ui/timetable.tsx";
import { personActor } from "#app/context.ts";
import { readForm } from "#app/lib/form.ts";
import { formatInstant } from "#app/lib/format.ts";
import { idParam } from "#app/lib/params.ts";
import { endOwnSession, listOwnSessions } from "#app/services/sessions.server.ts";
import type { Route } from "./+types/account";

export async function loader({ context }: Route.LoaderArgs) {
  const actor = personActor(context);
  return {
    name: actor.name,
    role: actor.role,
    townName: actor.kind === "town" ? actor.townName : null,
    sessions: await listOwnSessions(actor),
  };
}

export async function action({ context, request }: Route.ActionArgs) {
  const form = await readForm(request);
  const sessionId = form.get("sessionId");
  await endOwnSession(personActor(context), idParam(typeof sessionId === "string" ? sessionId : "", "session"));
  return redirect("/account");
}

export const meta: Route.MetaFunction = () => [{ title: "You · Commonweigh" }];

/** The kind of machine, as far as its browser says. */
function deviceWords(device: string) {
  const system = ["Android", "iPhone", "iPad", "Windows", "Mac OS", "Linux"].find((name) => device.includes(name));
  return system ?? "another device";
}

export default function Account({ loaderData: { name, role, townName, sessions } }: Route.ComponentProps) {
  return (
    <Page>
      <Answer>
        You are signed in as {name}, {role}
        {townName === null ? "" : ` of ${townName}`}.
      </Answer>
      <Method>Your name and address come from the sign-in service; your role comes from the coordinator.</Method>
      <Form method="post" action="/logout" reloadDocument className="mt-6">
        <Button>Sign out</Button>
      </Form>
      <Heading>Where you are signed in</Heading>
      <Timetable
        caption="Your open sessions, newest first"
        columns={[
          { key: "device", label: "device" },
          { key: "since", label: "since" },
          { key: "seen", label: "last used" },
          { key: "end", label: "" },
        ]}
        rows={sessions.map((session) => ({
          key: String(session.id),
          isOurs: session.isThisOne,
          cells: {
            device: deviceWords(session.device) + (session.isThisOne ? ", this one" : ""),
            since: formatInstant(session.createdAt),
            seen: formatInstant(session.lastSeenAt),
            end: session.isThisOne ? (
              " "
            ) : (
              <Form method="post">
                <input type="hidden" name="sessionId" value={session.id} />
                <Button variant="quiet" size="slim">
                  End it
                </Button>
              </Form>
            ),
          },
        }))}
      />
    </Page>
  );
}
