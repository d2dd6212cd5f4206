import { use, useEffect } from "react";
import {
  type ErrorResponse,
  isRouteErrorResponse,
  Links,
  Meta,
  Outlet,
  Scripts,
  ScrollRestoration,
  useMatches,
  useRouteLoaderData,
} from "react-router";
import { Answer, Method } from "#app/components/layout/answer.tsx";
import { NonceContext } from "#app/components/layout/nonce.ts";
import { Page } from "#app/components/layout/page.tsx";
import { PublicBar } from "#app/components/layout/public-bar.tsx";
import { type Area, TopBar } from "#app/components/layout/top-bar.tsx";
import { ButtonLink } from "#app/components/ui/button.tsx";
import { type PersonActor, requestIdContext, type Role, visitorContext } from "#app/context.ts";
import { seasonLabel, seasonStartYearOf } from "#app/domain/dates.ts";
import { now } from "#app/lib/clock.server.ts";
import { isPublicError } from "#app/lib/errors.ts";
import { accessMiddleware } from "#app/middleware/auth.server.ts";
import { originMiddleware } from "#app/middleware/origin.server.ts";
import { requestMiddleware } from "#app/middleware/request.server.ts";
import type { Route } from "./+types/root";
import "./app.css";

export const middleware: Route.MiddlewareFunction[] = [requestMiddleware, originMiddleware, accessMiddleware];

const townAreas = [
  { label: "Today", to: "/today" },
  { label: "Fleet", to: "/fleet" },
  { label: "Season", to: "/season" },
  { label: "Peers", to: "/peers" },
  { label: "Workshops", to: "/workshops" },
  { label: "Dataset", to: "/dataset" },
];

const areasByRole: Record<Role, readonly Area[]> = {
  recorder: townAreas,
  director: townAreas,
  coordinator: [
    { label: "Today", to: "/today" },
    { label: "Network", to: "/network" },
    { label: "Workshops", to: "/workshops" },
    { label: "Dataset", to: "/dataset" },
  ],
  analyst: [
    { label: "Today", to: "/today" },
    { label: "Dataset", to: "/dataset" },
  ],
};

const placeByKind: Record<PersonActor["kind"], string> = { town: "", network: "The network", analyst: "Open dataset" };

/** For pages that do not get to give their own. */
export const meta: Route.MetaFunction = ({ error }) => [
  {
    title:
      error === undefined
        ? "Commonweigh"
        : `${words(isRouteErrorResponse(error) ? error : null).title.replace(/\.$/, "")} · Commonweigh`,
  },
];

export function loader({ context }: Route.LoaderArgs) {
  const visitor = context.get(visitorContext);
  return {
    requestId: context.get(requestIdContext),
    period: seasonLabel(seasonStartYearOf(now().toISOString().slice(0, 10))),
    visitor: visitor && {
      userId: visitor.userId,
      name: visitor.name,
      role: visitor.role,
      place: visitor.kind === "town" ? visitor.townName : placeByKind[visitor.kind],
    },
  };
}

export function Layout({ children }: { children: React.ReactNode }) {
  const nonce = use(NonceContext);
  return (
    <html lang="en">
      <head>
        <meta charSet="utf-8" />
        {/* Lets Vite's development styles through; browsers hide it, so the two sides differ. */}
        <meta property="csp-nonce" nonce={nonce} suppressHydrationWarning />
        <meta name="viewport" content="width=device-width, initial-scale=1" />
        <link rel="icon" href="/favicon.svg" type="image/svg+xml" />
        <Meta />
        <Links />
      </head>
      <body>
        {children}
        <ScrollRestoration />
        <Scripts />
      </body>
    </html>
  );
}

/** What a page tells the frame around it. */
export type FrameHandle = { isWall?: boolean; notForSharing?: boolean; isSignIn?: boolean };

function useFrame(): FrameHandle {
  return useMatches().reduce<FrameHandle>((frame, { handle }) => {
    const isHandle = typeof handle === "object" && handle !== null;
    return {
      isWall: frame.isWall === true || (isHandle && "isWall" in handle && handle.isWall === true),
      isSignIn: frame.isSignIn === true || (isHandle && "isSignIn" in handle && handle.isSignIn === true),
      notForSharing:
        frame.notForSharing === true || (isHandle && "notForSharing" in handle && handle.notForSharing === true),
    };
  }, {});
}

function Bar({ notForSharing, isSignIn = false }: { notForSharing: boolean; isSignIn?: boolean }) {
  const frame = useRouteLoaderData<typeof loader>("root");
  if (!frame?.visitor) return <PublicBar hasSignIn={!isSignIn} />;
  const { visitor, period } = frame;
  return (
    <TopBar
      areas={areasByRole[visitor.role]}
      place={visitor.place}
      period={period}
      person={visitor.name}
      notForSharing={notForSharing}
    />
  );
}

/** After signing out, the phone shows nobody's worksheets; they stay for their owner. */
function useForgetting(isSignedOut: boolean) {
  useEffect(() => {
    if (isSignedOut)
      void import("#app/offline/store.client.ts").then(({ forgetOwner }) => forgetOwner()).catch(() => undefined);
  }, [isSignedOut]);
}

export default function App() {
  const frame = useFrame();
  const data = useRouteLoaderData<typeof loader>("root");
  // Pages without a frame are kept by the phone as a signed-out visitor sees them, whoever is signed in.
  useForgetting(frame.isWall !== true && data?.visitor === null);
  if (frame.isWall === true) return <Outlet />;
  return (
    <>
      <Bar notForSharing={frame.notForSharing === true} isSignIn={frame.isSignIn === true} />
      <Outlet />
    </>
  );
}

const titles: Record<number, string> = {
  400: "This request was not understood.",
  401: "You are not signed in.",
  403: "This is not open to you.",
  409: "Somebody else was first.",
  413: "This file is too large.",
  503: "Something this page needs is away just now.",
};

/** A page that is not there says in its first sentence what is not there; the others have a title by their status. */
function words(error: ErrorResponse | null) {
  const message = error !== null && isPublicError(error.data) ? error.data.message : null;
  const [first = "", ...rest] = message?.split(/(?<=\.) /) ?? [];
  if (error?.status === 404 && message !== null) return { title: first, message: rest.join(" ") };
  return { title: titles[error?.status ?? 500] ?? "Something went wrong on our side.", message };
}

export function ErrorBoundary({ error }: Route.ErrorBoundaryProps) {
  const frame = useRouteLoaderData<typeof loader>("root");
  const isExpected = isRouteErrorResponse(error);
  const isSignedIn = frame?.visitor !== undefined && frame.visitor !== null;
  // Whoever is told that a page is not open to them has signed in, though the refusal comes before their name is read.
  const isKnown = isSignedIn || (isExpected && error.status === 403);
  const { title, message } = words(isExpected ? error : null);
  return (
    <>
      {isKnown && !isSignedIn ? <PublicBar hasSignIn={false} /> : <Bar notForSharing={false} />}
      <Page>
        <Answer>{title}</Answer>
        {message !== null && <Method>{message}</Method>}
        {!isExpected && (
          <Method>
            What you had sent before this page is kept. Try again in a minute; if it happens again, tell your
            coordinator{frame ? ` and name request ${frame.requestId}` : ""}.
          </Method>
        )}
        <p className="mt-6">
          <ButtonLink to={isKnown ? "/today" : "/"} isDocument>
            {isKnown ? "Go to Today" : "Go to the front page"}
          </ButtonLink>
        </p>
      </Page>
    </>
  );
}
