import { exampleStrip, FrontStrip } from "#app/components/charts/front-strip.tsx";
import { laneStripSvg, laneStripSvgs } from "#app/components/charts/lane-strip-svg.server.ts";
import { LaneStrip } from "#app/components/charts/lane-strip.tsx";
import { stripParts } from "#app/components/charts/lane-strip-spec.ts";
import { StripKey } from "#app/components/charts/strip-key.tsx";
import { WallStrip } from "#app/components/charts/wall-strip.tsx";
import { Answer, Heading, Method } from "#app/components/layout/answer.tsx";
import { Page } from "#app/components/layout/page.tsx";
import { FormSamples } from "#app/components/samples/form-samples.tsx";
import { PartSamples } from "#app/components/samples/part-samples.tsx";
import { stripSamples, wallSample } from "#app/components/samples/strip-samples.ts";
import { Dock } from "#app/components/ui/dock.tsx";
import { Button } from "#app/components/ui/button.tsx";
import { env } from "#app/lib/env.server.ts";
import { notFound } from "#app/lib/errors.ts";
import type { Route } from "./+types/components";

export function loader() {
  if (!env.devPages) throw notFound("page");
  return {
    strips: stripSamples,
    front: laneStripSvgs(exampleStrip),
    wall: { svg: laneStripSvg(wallSample, "wall"), phoneSvg: laneStripSvg(wallSample, "phone") },
  };
}

export const meta: Route.MetaFunction = () => [{ title: "Components" }];

export default function Components({ loaderData }: Route.ComponentProps) {
  const { strips, front, wall } = loaderData;
  const full = strips.find((strip) => strip.key === "twelve")?.spec;
  return (
    <>
      <Page>
        <Answer>Every part of the program in every state, with invented figures.</Answer>
        <Method>
          For whoever changes one of them: look here at both widths, in both themes and in the print preview.
        </Method>
        <Heading>The lane strip by count of towns</Heading>
        {full !== undefined && <StripKey parts={stripParts(full)} hasBand={full.band !== null} />}
        {strips.map(({ key, ...strip }) => (
          <LaneStrip key={key} {...strip} downloadTo="/components" isTableOpen={key === "twelve"} />
        ))}
        <Heading>On the wall</Heading>
        <WallStrip {...wall} />
        <Heading>On the front page</Heading>
        <FrontStrip svg={front} />
        <PartSamples />
        <FormSamples />
        <Heading>In the dark</Heading>
        <div data-theme="dark" className="-mx-4 bg-salt p-4 text-asphalt">
          <WallStrip {...wall} />
          <p className="mt-4">
            <Button type="button">Weigh the catch</Button>
          </p>
        </div>
      </Page>
      <Dock summaryId="dock-summary" summary={<b>197 ready, 17 to go.</b>}>
        <Button type="button" notYet={{ reasonId: "dock-summary" }}>
          Accept all 214
        </Button>
      </Dock>
    </>
  );
}
