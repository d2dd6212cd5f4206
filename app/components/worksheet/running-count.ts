/** A count by the clock that is going on: kept on the phone, so that a page opened again goes on with it. */
export type RunningCount = { setting: string; seconds: number; startedAtMs: number; turns: number };
