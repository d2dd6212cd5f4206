import { env } from "#app/lib/env.server.ts";
import { notFound } from "#app/lib/errors.ts";

/** The least page there can be: what every other page is measured against. Not there in production. */
export function loader() {
  if (!env.devPages) throw notFound("page");
  return { words: "A bare page." };
}

export const meta = () => [{ title: "Bare page" }];

export default function Bare({ loaderData }: { loaderData: { words: string } }) {
  return <p>{loaderData.words}</p>;
}
