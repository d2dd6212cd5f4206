import { Form, redirect, useNavigation } from "react-router";
import { CheckField } from "#app/components/forms/check-field.tsx";
import { Answer, Heading, Method } from "#app/components/layout/answer.tsx";
import { Page } from "#app/components/layout/page.tsx";
import { Button } from "#app/components/ui/button.tsx";
import { Timetable } from "#app/components/ui/timetable.tsx";
import { personActor } from "#app/context.ts";
import { readForm } from "#app/lib/form.ts";
import { formatInstant } from "#app/lib/format.ts";
import { mailOccasionWords } from "#app/domain/mail-occasions.ts";
import { idParam } from "#app/lib/params.ts";
import { listMailChoices, saveMailChoices } from "#app/services/mail-choices.server.ts";
import { endOwnSession, listOwnSessions } from "#app/services/sessions.server.ts";
import type { Route } from "./+types/account";

export async function loader({ context }: Route.LoaderArgs) {
  const actor = personActor(context);
  const [sessions, mailChoices] = await Promise.all([listOwnSessions(actor), listMailChoices(actor)]);
  return {
    name: actor.name,
    role: actor.role,
    townName: actor.kind === "town" ? actor.townName : null,
    sessions,
    mailChoices,
  };
}

export async function action({ context, request }: Route.ActionArgs) {
  const form = await readForm(request);
  const actor = personActor(context);
  if (form.get("intent") === "mail") {
    await saveMailChoices(
      actor,
      form.getAll("occasion").filter((occasion) => typeof occasion === "string"),
    );
    return redirect("/account");
  }
  const sessionId = form.get("sessionId");
  await endOwnSession(actor, idParam(typeof sessionId === "string" ? sessionId : "", "session"));
  return redirect("/account");
}

export const meta: Route.MetaFunction = () => [{ title: "You · Commonweigh" }];

/** The kind of machine, as far as its browser says. */
function deviceWords(device: string) {
  const system = ["Android", "iPhone", "iPad", "Windows", "Mac OS", "Linux"].find((name) => device.includes(name));
  return system ?? "another device";
}

export default function Account({ loaderData }: Route.ComponentProps) {
  const { name, role, townName, sessions, mailChoices } = loaderData;
  const isSaving = useNavigation().formData?.get("intent") === "mail";
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
      {mailChoices.length > 0 && (
        <section>
          <Heading>Mail you get</Heading>
          <Form method="post">
            <fieldset>
              <legend>Write to me when</legend>
              {mailChoices.map(({ occasion, isWanted }) => (
                <CheckField
                  key={occasion}
                  id={`mail-${occasion}`}
                  name="occasion"
                  value={occasion}
                  label={mailOccasionWords[occasion]}
                  defaultChecked={isWanted}
                />
              ))}
            </fieldset>
            <div className="mt-3">
              <Button variant="quiet" name="intent" value="mail" busy={isSaving && "Saving"}>
                Save the choice
              </Button>
            </div>
          </Form>
        </section>
      )}
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
