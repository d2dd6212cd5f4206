import { notFound } from "#app/lib/errors.ts";

/** Every address that is no page: refused by loader and action, so that it meets the middleware like the others. */
export function loader() {
  throw notFound("page");
}

export function action() {
  throw notFound("page");
}

export default function NotFound() {
  return null;
}
