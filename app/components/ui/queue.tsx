import type { ReactNode } from "react";
import { TextLink } from "./text-link.tsx";

export type QueueItem = {
  key: string;
  name: string;
  /** When it came, how large the town is. */
  detail: string;
  /** The reason it is in the queue, in one sentence. */
  why: ReactNode;
  to: string;
  /** Words of the link. */
  action?: string;
  /** Evidence and decision of the item one is looking at. */
  open?: ReactNode;
};

/** What needs a look, most doubtful first. The open item carries its evidence and the decision. */
export function Queue({ items }: { items: readonly QueueItem[] }) {
  return (
    <ol className="mt-6 border-t-2 border-line">
      {items.map((item, position) => (
        <QueueRow key={item.key} item={item} number={position + 1} />
      ))}
    </ol>
  );
}

function QueueRow({ item, number }: { item: QueueItem; number: number }) {
  const isOpen = item.open !== undefined;
  return (
    <li
      className={`grid grid-cols-[2rem_minmax(0,1fr)] gap-x-5 gap-y-1.5 leading-snug md:grid-cols-[2rem_15.5rem_minmax(0,1fr)_auto] ${isOpen ? "border-b-2 border-line pt-4.5 pb-6" : "border-b border-rule py-3.25"}`}
    >
      <span className={`font-bold ${isOpen ? "text-2xl leading-none" : "text-l leading-tight text-gravel"}`}>
        {number}
      </span>
      <div>
        <h2 className={`font-bold ${isOpen ? "text-l leading-snug" : "text-head"}`}>{item.name}</h2>
        <p className="text-note text-gravel">{item.detail}</p>
      </div>
      <div className="col-start-2 md:col-start-auto">
        <div className={`text-pretty ${isOpen ? "max-w-measure text-l leading-snug font-semibold" : "max-w-[46rem]"}`}>
          {item.why}
        </div>
        {isOpen && <div className="mt-4">{item.open}</div>}
      </div>
      {!isOpen && (
        <p className="col-start-2 md:col-start-auto md:text-right">
          <TextLink to={item.to} weight="bold" className="inline-flex min-h-target items-center md:min-h-6">
            {item.action ?? "Look closer"}
            <span className="sr-only"> at {item.name}</span>
          </TextLink>
        </p>
      )}
    </li>
  );
}
