import { useEffect, useSyncExternalStore } from "react";
import { useParams } from "react-router";
import { SheetFrame } from "#app/components/worksheet/sheet-frame.tsx";
import { Say } from "#app/components/worksheet/yard-field.tsx";
import { NewWorksheet, PhoneList } from "#app/offline/phone-pages.client.tsx";
import { keepProgram } from "#app/offline/worker.client.ts";
import { WorksheetDesk } from "#app/offline/worksheet-desk.client.tsx";
import type { Route } from "./+types/worksheet";

// No loader, on purpose: this page is the same for everybody and holds nobody's data, so the phone may keep it. What it
// shows comes from the phone's own store, and over the wire only from addresses that ask who is there.

export const handle = { isWall: true };

export const meta: Route.MetaFunction = () => [{ title: "Worksheet · Commonweigh" }];

const nothing = () => () => undefined;

export default function WorksheetPage() {
  const { clientRef = "" } = useParams();
  const isInBrowser = useSyncExternalStore(
    nothing,
    () => true,
    () => false,
  );
  useEffect(() => keepProgram(), []);
  if (!isInBrowser) {
    return (
      <SheetFrame title="Worksheet" standing={null} steps={[]}>
        <Say>Opening the worksheet …</Say>
        <noscript>
          <p className="mt-2">The worksheet counts, computes and keeps on the phone itself: it needs JavaScript.</p>
        </noscript>
      </SheetFrame>
    );
  }
  if (clientRef === "phone") return <PhoneList />;
  if (clientRef === "new") return <NewWorksheet />;
  return <WorksheetDesk key={clientRef} clientRef={clientRef} />;
}
