// What the bench measures of the application, compiled once before it starts.
export { defaultPolicy } from "#app/domain/disclosure/policy.ts";
export { buildEdition } from "#app/domain/peers/edition.ts";
export { groupKeysOf } from "#app/domain/peers/peer-groups.ts";
export { seasonFileColumns } from "#app/domain/season/season-file.ts";
export { readCsv } from "#app/lib/csv.server.ts";
