import type { ReactNode } from "react";
import { Link } from "react-router";
import { WholeSeasons } from "#app/components/layout/whole-seasons.tsx";

export type AgendaItem = {
  key: string;
  /** Now, This week, By 31 Oct. */
  when: string;
  /** How long it takes, or how far off it is. */
  whenDetail?: string;
  title: string;
  to?: string;
  children?: ReactNode;
  /** The page's one button; the first item holds it. */
  action?: ReactNode;
};

/** The road of Today: what waits for you, in the order to do it. The first item is the next step. */
export function Agenda({ items }: { items: readonly AgendaItem[] }) {
  return (
    <div className="relative pl-10 sm:pl-0">
      <div
        aria-hidden="true"
        className="road-bed absolute inset-y-0 left-0 w-6.5 rounded-plate sm:left-[9.65rem] print:hidden"
      />
      <ol>
        {items.map((item, position) => (
          <AgendaRow key={item.key} item={item} isFirst={position === 0} />
        ))}
      </ol>
    </div>
  );
}

function AgendaRow({ item, isFirst }: { item: AgendaItem; isFirst: boolean }) {
  const stop = isFirst ? "road-stop-now -left-2 -right-2 h-2.25" : "road-stop -left-1.5 -right-1.5 h-1.25";
  return (
    <li className="relative gap-x-5 border-b border-rule last:border-0 sm:grid sm:grid-cols-[8.4rem_1.625rem_minmax(0,1fr)] sm:border-0">
      <p className="pt-3 leading-snug font-semibold sm:pt-3.75 sm:text-right">
        {item.when}
        {item.whenDetail !== undefined && (
          <span className="ml-2 text-note font-normal text-gravel tabular-nums sm:ml-0 sm:block">
            {item.whenDetail}
          </span>
        )}
      </p>
      <div aria-hidden="true" className="absolute top-0 -left-10 h-full w-6.5 sm:static sm:h-auto print:invisible">
        <span className="relative block h-full">
          <span className={`absolute top-5.25 block ${stop}`} />
        </span>
      </div>
      <div className={`pb-5 sm:border-b sm:border-rule [li:last-child>&]:border-0 ${isFirst ? "sm:pt-2" : "sm:pt-3"}`}>
        <AgendaTitle item={item} isFirst={isFirst} />
        {item.children !== undefined && (
          <div className="mt-0.5 max-w-measure text-pretty text-gravel">{item.children}</div>
        )}
        {item.action !== undefined && <div className="mt-3">{item.action}</div>}
      </div>
    </li>
  );
}

function AgendaTitle({ item, isFirst }: { item: AgendaItem; isFirst: boolean }) {
  const look = isFirst ? "text-xl leading-[1.3] font-bold" : "text-l leading-[1.3] font-semibold";
  return (
    <h2 className={`tracking-[-0.005em] ${look}`}>
      {item.to === undefined ? (
        <WholeSeasons>{item.title}</WholeSeasons>
      ) : (
        <Link to={item.to} className="text-asphalt no-underline decoration-2 underline-offset-4 hover:underline">
          <WholeSeasons>{item.title}</WholeSeasons>
        </Link>
      )}
    </h2>
  );
}
