import { useEffect, useRef, useState } from "react";
import type { RunningCount } from "./running-count.ts";
import { MinuteRoad } from "./minute-road.tsx";
import { useCountdown } from "./use-countdown.ts";
import { YardKey } from "./yard-field.tsx";

const quarters = [
  { share: 0, sign: "0", words: "no part turn" },
  { share: 0.25, sign: "¼", words: "a quarter turn" },
  { share: 0.5, sign: "½", words: "half a turn" },
  { share: 0.75, sign: "¾", words: "three quarters of a turn" },
] as const;

type Props = {
  running: RunningCount;
  hasSound: boolean;
  onTurns: (turns: number) => void;
  onStop: () => void;
  onTake: (counted: { revolutions: number; seconds: number }) => void;
};

function clockWords(leftSeconds: number) {
  const whole = Math.ceil(leftSeconds);
  return `${Math.floor(whole / 60)}:${String(whole % 60).padStart(2, "0")}`;
}

/** One count by the clock: a pad as large as the thumb can miss, and the part turn once the time is up. */
export function TurnPad({ running, hasSound, onTurns, onStop, onTake }: Props) {
  const { seconds, startedAtMs, turns } = running;
  const [stoppedAt, setStoppedAt] = useState<number | null>(null);
  const [partTurn, setPartTurn] = useState(0);
  const gone = useCountdown(stoppedAt === null ? startedAtMs : null, seconds, hasSound);
  const counted = stoppedAt ?? gone;
  const isOver = stoppedAt !== null || gone >= seconds;
  const wasTouched = useRef(false);
  const firstQuarter = useRef<HTMLButtonElement>(null);
  const pad = useRef<HTMLButtonElement>(null);

  useEffect(() => {
    if (isOver) firstQuarter.current?.focus();
    else pad.current?.focus();
  }, [isOver]);

  const pace = counted > 8 && turns > 0 ? Math.round((turns / counted) * seconds) : null;
  return (
    <div>
      <div className="mt-3 flex items-end justify-between gap-4">
        <p
          role="timer"
          aria-label="Time left"
          className="text-[5.25rem] leading-[0.86] font-bold tracking-[-0.04em] tabular-nums"
        >
          {clockWords(seconds - counted)}
        </p>
        <p className="text-right text-table leading-snug text-gravel">
          {isOver ? (
            <>
              {stoppedAt === null ? "time is up" : `stopped at ${Math.round(counted)} s`}
              <br />
              add the part turn
            </>
          ) : (
            <>
              left of {seconds === 60 ? "one minute" : `${seconds} seconds`}
              {pace !== null && (
                <>
                  <br />
                  about {pace} turns
                  <br />
                  at this pace
                </>
              )}
            </>
          )}
        </p>
      </div>
      <MinuteRoad goneSeconds={counted} seconds={seconds} />
      <button
        ref={pad}
        type="button"
        aria-disabled={isOver || undefined}
        // A finger counts when it comes down; keys and screen readers click.
        onPointerDown={(event) => {
          if (event.button !== 0 || isOver) return;
          wasTouched.current = true;
          onTurns(turns + 1);
        }}
        onClick={() => {
          if (!wasTouched.current && !isOver) onTurns(turns + 1);
          wasTouched.current = false;
        }}
        className={`mt-3.5 grid min-h-48 w-full touch-manipulation grid-cols-[auto_1fr] items-center gap-4 rounded-field px-5 text-left select-none ${isOver ? "bg-frost text-gravel" : "bg-spruce text-on-spruce active:bg-spruce-deep"}`}
      >
        <span>
          <b className="block text-[1.75rem] leading-none">Turn</b>
          <span className="mt-2 block max-w-28 text-m leading-tight">each time the mark comes round</span>
        </span>
        <b
          className={`text-right leading-[0.8] tracking-[-0.05em] tabular-nums ${turns > 99 ? "text-[5rem]" : "text-[7.5rem]"}`}
        >
          {turns}
        </b>
      </button>
      <fieldset className="mt-2.5">
        <legend className="text-table leading-tight">
          {isOver ? "How far had the mark come round?" : "When the time is up, add the part turn:"}
        </legend>
        <div className="mt-1.5 grid grid-cols-4 gap-2">
          {quarters.map(({ share, sign, words }) => (
            <button
              key={sign}
              ref={share === 0 ? firstQuarter : undefined}
              type="button"
              aria-label={words}
              aria-pressed={partTurn === share}
              onClick={() => setPartTurn(share)}
              className="min-h-14 touch-manipulation rounded-field border-2 border-asphalt bg-snow text-l font-bold aria-pressed:bg-asphalt aria-pressed:text-salt"
            >
              {sign}
            </button>
          ))}
        </div>
      </fieldset>
      <div className="mt-2 grid grid-cols-2 gap-2">
        {isOver ? (
          <>
            <YardKey onClick={onStop}>Count again</YardKey>
            <button
              type="button"
              onClick={() => onTake({ revolutions: turns + partTurn, seconds: Math.round(counted * 10) / 10 })}
              className="min-h-target-yard touch-manipulation rounded-field bg-spruce px-3 text-head leading-tight font-semibold text-on-spruce active:bg-asphalt"
            >
              Keep {turns + partTurn} turns
            </button>
          </>
        ) : (
          <>
            <YardKey onClick={() => onTurns(Math.max(0, turns - 1))}>Take one off</YardKey>
            {gone >= 5 ? (
              <YardKey onClick={() => setStoppedAt(gone)}>Stop here</YardKey>
            ) : (
              <YardKey onClick={onStop}>Start over</YardKey>
            )}
          </>
        )}
      </div>
    </div>
  );
}
