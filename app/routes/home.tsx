import { redirect } from "react-router";
import { exampleStrip, FrontStrip } from "#app/components/charts/front-strip.tsx";
import { laneStripSvgs } from "#app/components/charts/lane-strip-svg.server.ts";
import { TextLink } from "#app/components/ui/text-link.tsx";
import { Timetable } from "#app/components/ui/timetable.tsx";
import { visitorContext } from "#app/context.ts";
import type { Route } from "./+types/home";

export function loader({ context }: Route.LoaderArgs) {
  if (context.get(visitorContext)) throw redirect("/today");
  return { svg: laneStripSvgs(exampleStrip) };
}

export const meta: Route.MetaFunction = () => [
  { title: "Commonweigh: what a lane mile gets" },
  {
    name: "description",
    content:
      "Where the towns of a snow region measure what each truck lays on a lane mile, and compare it without being shown.",
  },
];

const people = [
  {
    who: "in the yard",
    come: "put in what each truck lays, counted and weighed",
    leave: "a rate for every truck, setting and speed",
  },
  {
    who: "running the town’s roads",
    come: "see much or little, for the roads and the winter you had",
    leave: "a gate to change, and a page for the board",
  },
  {
    who: "bringing towns together",
    come: "review figures, publish an edition, run a workshop from it",
    leave: "boards a full room can talk about",
  },
  {
    who: "studying salt on roads",
    come: "download protected data with its dictionary",
    leave: "figures safe to publish, and their method",
  },
];

export default function Home({ loaderData: { svg } }: Route.ComponentProps) {
  return (
    <main id="main" tabIndex={-1}>
      <div className="mx-auto w-full max-w-column px-4 pt-6 sm:px-8 sm:pt-8">
        <h1 className="max-w-[16.6em] text-[clamp(2.25rem,6.4vw,4rem)] leading-[1.06] font-bold tracking-[-0.028em] text-balance">
          Weigh in. See where you stand. Change one thing. Weigh in again.
        </h1>
        <p className="mt-5 max-w-measure text-l leading-normal">
          Commonweigh is where the towns of a snow region measure what each truck really lays on a lane mile, and
          compare it, without any town’s figures being shown to another.
        </p>
      </div>
      <div className="mt-6">
        <FrontStrip svg={svg} />
      </div>
      <div className="mx-auto w-full max-w-column px-4 pt-8 pb-12 sm:px-8">
        <Timetable
          caption="Who comes, and for what"
          isCaptionHidden
          columns={[
            { key: "who", label: "if you are" },
            { key: "come", label: "you come to", isProse: true },
            { key: "leave", label: "and leave with", isProse: true },
          ]}
          rows={people.map(({ who, come, leave }) => ({
            key: who,
            cells: {
              who,
              come,
              // On a phone there is no head to say it.
              leave: (
                <>
                  <span className="text-gravel sm:hidden">and leave with </span>
                  {leave}
                </>
              ),
            },
          }))}
        />
        <p className="mt-8">
          Towns join through their regional office, by invitation.{" "}
          <TextLink to="/protection">How towns are protected</TextLink>
        </p>
      </div>
    </main>
  );
}
