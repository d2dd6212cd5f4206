import { useEffect, useRef, useSyncExternalStore } from "react";
import { nextStep, type WorksheetStep, worksheetSteps } from "#app/domain/calibration/worksheet.ts";
import type { KitTruck } from "#app/domain/calibration/yard-kit.ts";
import type { Draft } from "./draft.ts";

const changed = new EventTarget();

function subscribe(listener: () => void) {
  changed.addEventListener("step", listener);
  window.addEventListener("popstate", listener);
  return () => {
    changed.removeEventListener("step", listener);
    window.removeEventListener("popstate", listener);
  };
}

/**
 * The step one is on, with an address of its own behind the #, so that the way back works. The router is not asked: it
 * would work the whole page out anew, and a slow phone shows that under the thumb.
 */
export function useStep(draft: Draft, truck: KitTruck): { step: WorksheetStep; go: (to: WorksheetStep) => void } {
  const hash = useSyncExternalStore(subscribe, () => window.location.hash);
  const named = worksheetSteps.find((one) => hash === `#${one}`);
  const step = named ?? (draft.calibrationId === null ? nextStep(draft.sheet, truck) : "card");

  useEffect(() => {
    // Without an address, filling in the last field of a step would turn the page.
    if (named) return;
    window.history.replaceState(window.history.state, "", `#${step}`);
    changed.dispatchEvent(new Event("step"));
  }, [named, step]);

  const before = useRef(step);
  useEffect(() => {
    if (before.current === step) return;
    before.current = step;
    window.scrollTo(0, 0);
    document.getElementById("step-heading")?.focus({ preventScroll: true });
  }, [step]);

  function go(to: WorksheetStep) {
    window.history.pushState(window.history.state, "", `#${to}`);
    changed.dispatchEvent(new Event("step"));
  }
  return { step, go };
}
