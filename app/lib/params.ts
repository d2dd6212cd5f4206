import { notFound } from "./errors.ts";

/**
 * A record's id from the address.
 *
 * @returns a whole number from 1 to 4,294,967,295
 * @throws 404 for anything else, named as `what`
 */
export function idParam(text: string | undefined, what: string): number {
  if (text === undefined || !/^[1-9]\d{0,9}$/.test(text)) throw notFound(what);
  const id = Number(text);
  if (id > 4_294_967_295) throw notFound(what);
  return id;
}

/** A season's first year from the address, 1990 to 2100. @throws 404 */
export function seasonParam(text: string | undefined): number {
  const year = idParam(text, "season");
  if (year < 1990 || year > 2100) throw notFound("season");
  return year;
}
