import { randomUUID } from "node:crypto";
import { data, Form } from "react-router";
import { TextField } from "#app/components/forms/field.tsx";
import { KeptForm } from "#app/components/forms/kept-form.tsx";
import { Answer, Heading, Method } from "#app/components/layout/answer.tsx";
import { Page } from "#app/components/layout/page.tsx";
import { Button } from "#app/components/ui/button.tsx";
import { Notice } from "#app/components/ui/notice.tsx";
import { Timetable } from "#app/components/ui/timetable.tsx";
import { analystActor } from "#app/context.ts";
import { env } from "#app/lib/env.server.ts";
import { readForm } from "#app/lib/form.ts";
import { formatShortDay } from "#app/lib/format.ts";
import { idParam } from "#app/lib/params.ts";
import { countWords, sentenceStart } from "#app/lib/words.ts";
import { createToken, listTokens, revokeToken } from "#app/services/tokens.server.ts";
import { z } from "zod";
import type { Route } from "./+types/tokens";

const NewTokenForm = z.object({ clientRef: z.uuid(), name: z.string().trim().min(1).max(80) });

export async function loader({ context }: Route.LoaderArgs) {
  const actor = analystActor(context);
  return { tokens: await listTokens(actor), userId: actor.userId, clientRef: randomUUID(), origin: env.publicOrigin };
}

export async function action({ context, request }: Route.ActionArgs) {
  const actor = analystActor(context);
  const form = await readForm(request);
  if (form.get("intent") === "revoke") {
    const tokenId = form.get("tokenId");
    await revokeToken(actor, idParam(typeof tokenId === "string" ? tokenId : "", "token"));
    return { token: null, error: null };
  }
  const parsed = NewTokenForm.safeParse(Object.fromEntries(form));
  if (!parsed.success)
    return data({ token: null, error: "Give the token a name, so that you know it again." }, { status: 400 });
  const token = await createToken(actor, parsed.data);
  if (token !== null) return { token, error: null };
  const error =
    "This form was sent before, and its token shown then. If you did not copy it, revoke it and make another.";
  return data({ token: null, error }, { status: 409 });
}

export const meta: Route.MetaFunction = () => [{ title: "Tokens · Commonweigh" }];

export default function Tokens({
  loaderData: { tokens, userId, clientRef, origin },
  actionData,
}: Route.ComponentProps) {
  const isEmpty = tokens.length === 0;
  return (
    <Page>
      <Answer>
        {isEmpty
          ? "You have no token yet."
          : `${sentenceStart(countWords(tokens.length, "token fetches", "tokens fetch"))} the dataset for you.`}
      </Answer>
      <Method>
        A token is a key for one program, good for a year. It is sent in the header, never in the address. The terms of
        use hold for programs too.
      </Method>
      {actionData?.token && (
        <Notice tone="good" title="Copy the token now: it is shown this once.">
          <code className="block bg-frost p-3 break-all select-all">{actionData.token}</code>
          <p className="mt-3">For example:</p>
          <code className="block bg-frost p-3 text-note break-all">
            curl -H &quot;Authorization: Bearer {actionData.token}&quot; {origin}/api/v1/editions
          </code>
        </Notice>
      )}
      <Heading>Make a token</Heading>
      <KeptForm key={clientRef} formKey="token" ownerId={userId} method="post" className="grid gap-5">
        <input type="hidden" name="clientRef" value={clientRef} />
        <TextField
          name="name"
          label="What it is for"
          maxLength={80}
          hint="For example: the yearly report"
          error={actionData?.error}
          required
        />
        <div>
          <Button>Make the token</Button>
        </div>
      </KeptForm>
      {!isEmpty && (
        <>
          <Heading>Your tokens</Heading>
          <Timetable
            caption="Open tokens, newest first"
            isCaptionHidden
            columns={[
              { key: "name", label: "for" },
              { key: "made", label: "made" },
              { key: "used", label: "last used" },
              { key: "until", label: "good until" },
              { key: "revoke", label: "" },
            ]}
            rows={tokens.map((token) => ({
              key: String(token.id),
              cells: {
                name: token.name,
                made: formatShortDay(token.createdAt.slice(0, 10)),
                used: token.lastUsedOn === null ? "never" : formatShortDay(token.lastUsedOn),
                until: formatShortDay(token.expiresAt.slice(0, 10)),
                revoke: (
                  <Form method="post">
                    <input type="hidden" name="intent" value="revoke" />
                    <input type="hidden" name="tokenId" value={token.id} />
                    <Button variant="quiet" size="slim">
                      Revoke<span className="sr-only"> {token.name}</span>
                    </Button>
                  </Form>
                ),
              },
            }))}
          />
        </>
      )}
    </Page>
  );
}
