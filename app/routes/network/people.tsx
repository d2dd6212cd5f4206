import { randomUUID } from "node:crypto";
import { getFormProps, useForm } from "@conform-to/react";
import { getZodConstraint, parseWithZod } from "@conform-to/zod/v4";
import { data, Form, redirect } from "react-router";
import { z } from "zod";
import { TextField } from "#app/components/forms/field.tsx";
import { fieldWords } from "#app/components/forms/field-words.ts";
import { KeptForm } from "#app/components/forms/kept-form.tsx";
import { SelectField } from "#app/components/forms/select-field.tsx";
import { NetworkPages } from "#app/components/network/network-pages.tsx";
import { Answer, Heading, Method } from "#app/components/layout/answer.tsx";
import { Page } from "#app/components/layout/page.tsx";
import { Button } from "#app/components/ui/button.tsx";
import { TextLink } from "#app/components/ui/text-link.tsx";
import { Timetable } from "#app/components/ui/timetable.tsx";
import { networkActor, roles } from "#app/context.ts";
import { readForm } from "#app/lib/form.ts";
import { formatShortDay } from "#app/lib/format.ts";
import { idParam } from "#app/lib/params.ts";
import { countWords, sentenceStart } from "#app/lib/words.ts";
import { invitePerson, listPeople, setPersonActive } from "#app/services/accounts.server.ts";
import type { Route } from "./+types/people";

export const handle = { notForSharing: true };

const needsTown = (role: string) => role === "recorder" || role === "director";

const InvitationForm = z
  .object({
    clientRef: z.uuid(),
    name: z
      .string({ error: "Give the person’s name." })
      .trim()
      .min(2, "Give the person’s name.")
      .max(120, "At most 120 letters."),
    email: z.email("Write one mail address, as in name@town.example.").max(254, "This address is too long."),
    role: z.enum(roles, "Choose a role."),
    townId: z
      .string()
      .regex(/^[1-9]\d{0,9}$/, "Choose a town.")
      .optional(),
  })
  .refine(({ role, townId }) => !needsTown(role) || townId !== undefined, {
    path: ["townId"],
    error: "A recorder or director acts for a town. Choose it.",
  });

export async function loader({ context, url }: Route.LoaderArgs) {
  const actor = networkActor(context);
  const find = (url.searchParams.get("find") ?? "").trim().slice(0, 80);
  return { ...(await listPeople()), find, userId: actor.userId, clientRef: randomUUID() };
}

export async function action({ context, request }: Route.ActionArgs) {
  const actor = networkActor(context);
  const form = await readForm(request);
  const intent = form.get("intent");
  if (intent === "shut-out" || intent === "readmit") {
    const userId = form.get("userId");
    await setPersonActive(actor, idParam(typeof userId === "string" ? userId : "", "person"), intent === "readmit");
    return redirect("/network/people");
  }
  const submission = parseWithZod(form, { schema: InvitationForm });
  if (submission.status !== "success") return data(submission.reply(), { status: 400 });
  const { townId, ...input } = submission.value;
  await invitePerson(actor, { ...input, townId: townId === undefined ? null : Number(townId) });
  return redirect("/network/people");
}

export const meta: Route.MetaFunction = () => [{ title: "People · Commonweigh" }];

export default function People({ loaderData, actionData }: Route.ComponentProps) {
  const { people, invitations, find, userId } = loaderData;
  const found = people.filter((person) => isFound(person, find));
  const open = invitations.length;
  return (
    <Page>
      <Answer>
        {people.filter(({ isActive }) => isActive).length} people are let in
        {open > 0 ? `; ${countWords(open, "invitation is", "invitations are")} open.` : "; no invitation is open."}
      </Answer>
      <Method>
        People come in by invitation only. What they may do follows from their role, and is theirs alone in their town.
      </Method>
      <div className="mt-5">
        <NetworkPages />
      </div>
      <Heading>Invite a person</Heading>
      <Invite loaderData={loaderData} actionData={actionData} />
      {open > 0 && (
        <>
          <Heading>Open invitations</Heading>
          <Timetable
            caption="Invitations not yet accepted"
            isCaptionHidden
            columns={[
              { key: "name", label: "for" },
              { key: "role", label: "as" },
              { key: "town", label: "of" },
              { key: "until", label: "good until" },
            ]}
            rows={invitations.map((invitation) => ({
              key: String(invitation.id),
              cells: {
                name: invitation.name,
                role: invitation.role,
                town: invitation.townName ?? "–",
                until: formatShortDay(invitation.expiresAt.slice(0, 10)),
              },
            }))}
          />
        </>
      )}
      <Heading>People</Heading>
      <Form method="get" role="search" className="mb-4 flex items-end gap-3">
        <div className="w-full max-w-field">
          <TextField name="find" label="Find people" defaultValue={find} key={find} />
        </div>
        <Button variant="quiet">Find</Button>
      </Form>
      {find !== "" && (
        <p className="mb-3">
          {sentenceStart(countWords(found.length, "person", "people"))} found.{" "}
          <TextLink to="/network/people">Show everybody</TextLink>
        </p>
      )}
      <Timetable
        caption={find === "" ? "Everybody in the network" : `People found by “${find}”`}
        isCaptionHidden
        hasStickyHead
        columns={[
          { key: "name", label: "name" },
          { key: "role", label: "may act as", isProse: true },
          { key: "email", label: "mail", isProse: true },
          { key: "state", label: "", isNumeric: true },
        ]}
        rows={found.map((person) => ({
          key: String(person.id),
          cells: {
            name: person.name,
            role: person.townName === null ? person.role : `${person.role} of ${person.townName}`,
            email: person.email,
            state:
              person.id === userId ? (
                "you"
              ) : (
                <Form method="post">
                  <input type="hidden" name="userId" value={person.id} />
                  <input type="hidden" name="intent" value={person.isActive ? "shut-out" : "readmit"} />
                  <Button variant="quiet" size="slim">
                    {person.isActive ? "Shut out" : "Let in again"}
                    <span className="sr-only"> {person.name}</span>
                  </Button>
                </Form>
              ),
          },
        }))}
      />
    </Page>
  );
}

type Person = Route.ComponentProps["loaderData"]["people"][number];

function isFound({ name, townName, email, role }: Person, find: string) {
  const text = [name, townName, email, role].join("\n").toLowerCase();
  return text.includes(find.toLowerCase());
}

function Invite({ loaderData, actionData }: Pick<Route.ComponentProps, "loaderData" | "actionData">) {
  const [form, fields] = useForm({
    lastResult: actionData,
    constraint: getZodConstraint(InvitationForm),
    onValidate: ({ formData }) => parseWithZod(formData, { schema: InvitationForm }),
    shouldRevalidate: "onInput",
  });
  return (
    <KeptForm
      key={loaderData.clientRef}
      formKey="invite"
      ownerId={loaderData.userId}
      method="post"
      {...getFormProps(form)}
      className="grid gap-5 md:grid-cols-2"
    >
      <input type="hidden" name="clientRef" value={loaderData.clientRef} />
      <TextField {...fieldWords(fields.name)} label="Name" autoComplete="off" />
      <TextField {...fieldWords(fields.email)} type="email" label="Mail address" autoComplete="off" />
      <SelectField
        {...fieldWords(fields.role)}
        label="Role"
        choices={roles.map((role) => ({ value: role, label: role }))}
      />
      <SelectField
        {...fieldWords(fields.townId)}
        label="Town"
        hint="For recorders and directors."
        prompt="choose a town"
        choices={loaderData.towns.map(({ id, name }) => ({ value: String(id), label: name }))}
      />
      <div>
        <Button>Send the invitation</Button>
      </div>
    </KeptForm>
  );
}
