import { useEffect } from "react";
import { Form, redirect } from "react-router";
import { armKeptForms } from "#app/components/forms/kept-form.tsx";
import { Answer, Method } from "#app/components/layout/answer.tsx";
import { Page } from "#app/components/layout/page.tsx";
import { Button } from "#app/components/ui/button.tsx";
import { Notice } from "#app/components/ui/notice.tsx";
import { visitorContext } from "#app/context.ts";
import { env } from "#app/lib/env.server.ts";
import { safeReturnTo } from "#app/lib/return-address.ts";
import type { Route } from "./+types/login";

export const handle = { isSignIn: true };

const problems: Record<string, { title: string; words: string }> = {
  "provider-away": {
    title: "The sign-in service does not answer.",
    words: "People who are signed in go on working. Try again in a few minutes.",
  },
  "start-again": {
    title: "That sign-in took too long, or began in another window.",
    words: "Nothing is lost. Start again here.",
  },
  refused: {
    title: "The sign-in service did not let you in.",
    words: "Try again, or ask whoever looks after your account there.",
  },
  "no-account": {
    title: "You are signed in there, but have no place in this network yet.",
    words: "Towns and people come in by invitation. Ask your coordinator for one; it comes by mail.",
  },
  "shut-out": { title: "Your place in this network is closed.", words: "Ask your coordinator if this is a mistake." },
  "invitation-spent": {
    title: "This invitation has been used, or its seven days are over.",
    words: "Ask your coordinator for a new one.",
  },
};

export function loader({ context, url }: Route.LoaderArgs) {
  const returnTo = safeReturnTo(url.searchParams.get("returnTo"), env.publicOrigin);
  const problem = url.searchParams.get("problem") ?? "";
  const isExpired = url.searchParams.get("expired") === "1";
  if (context.get(visitorContext) && problem === "") throw redirect(returnTo);
  return { returnTo, isExpired, problem: Object.hasOwn(problems, problem) ? (problems[problem] ?? null) : null };
}

export const meta: Route.MetaFunction = () => [{ title: "Sign in · Commonweigh" }];

export default function Login({ loaderData: { returnTo, isExpired, problem } }: Route.ComponentProps) {
  useEffect(() => {
    if (isExpired) armKeptForms();
  }, [isExpired]);
  return (
    <Page hasBottomBar={false}>
      <Answer>
        {isExpired
          ? "You have been signed out. Sign in, and the form is as you left it."
          : "Sign in to your town’s figures."}
      </Answer>
      <Method>
        {isExpired
          ? "Nothing was sent, and what you typed is kept in this tab."
          : "Your town’s figures are seen by your town and the coordinator. Other towns see only protected figures of many towns together."}
      </Method>
      {problem && (
        <Notice tone="problem" title={problem.title}>
          {problem.words}
        </Notice>
      )}
      <Form method="get" action="/auth/start" reloadDocument className="mt-6">
        <input type="hidden" name="returnTo" value={returnTo} />
        <Button>Sign in</Button>
      </Form>
    </Page>
  );
}
