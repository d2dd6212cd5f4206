import { useSyncExternalStore } from "react";

const nothingToHear = () => () => undefined;

/** False on the server and in the first view, true once the page is alive. */
export function useHydrated() {
  return useSyncExternalStore(
    nothingToHear,
    () => true,
    () => false,
  );
}
