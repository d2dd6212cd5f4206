import { z } from "zod";
import { isLocalDate } from "#app/domain/dates.ts";
import type { Worksheet } from "#app/domain/calibration/worksheet.ts";

/** As long as a field on the phone takes; what is typed there is kept as typed, right or wrong. */
const typed = z.string().max(40);
const readingId = z.string().regex(/^[\w-]{1,64}$/);
const recordId = z.int().min(1).max(4_294_967_295);

/** Readings of one kind: each id once, because the id is what makes a reading sent twice one reading. */
function readings<Shape extends z.core.$ZodLooseShape & { id: z.ZodString }>(shape: Shape) {
  return z
    .array(z.strictObject(shape))
    .max(60)
    .refine((rows) => new Set(rows.map((row) => Reflect.get(row, "id"))).size === rows.length);
}

/** A worksheet as a phone sends it and as it is stored. Whether its figures make sense is for the domain to say. */
export const SheetSchema = z.strictObject({
  schemaVersion: z.literal(1),
  clientRef: z.uuid(),
  truckId: recordId,
  materialId: recordId,
  testedOn: z.string().refine(isLocalDate),
  cautions: z.strictObject({ counting: z.boolean(), catching: z.boolean() }),
  gate: z.strictObject({ scaleMark: z.string().max(20), openingText: typed }),
  method: z.enum(["counts", "timed-catch"]),
  countsFromCalibrationId: recordId.nullable(),
  counts: readings({ id: readingId, setting: typed, revolutions: typed, seconds: typed, rpm: typed }),
  catches: readings({ id: readingId, revolutions: typed, grossLb: typed, tareLb: typed }),
  timedCatches: readings({ id: readingId, setting: typed, seconds: typed, grossLb: typed, tareLb: typed }),
  verification: readings({
    id: readingId,
    speedMph: typed,
    commandedLbPerLaneMile: typed,
    seconds: typed,
    grossLb: typed,
    tareLb: typed,
  }),
  liquids: readings({
    id: readingId,
    kind: z.enum(["prewet", "direct"]),
    gallons: typed,
    seconds: typed,
    speedMph: typed,
    lanes: typed,
    dryLbPerMin: typed,
  }),
  note: z.string().max(500),
}) satisfies z.ZodType<Worksheet>;

/** One message from a phone. `opId` is made on the phone and stays the same however often it is sent. */
export const SyncRequest = z
  .strictObject({
    opId: z.uuid(),
    /** Whose phone's draft it is, as "person:town": it must be the one who is signed in. */
    owner: z.string().regex(/^\d{1,10}:\d{1,10}$/),
    clientRef: z.uuid(),
    /** The server's version that the sheet grew from; 0 when the server has not had it yet. */
    baseVersion: z.int().min(0).max(1_000_000),
    sheet: SheetSchema,
    device: z.string().max(80),
    isFinish: z.boolean(),
    /** Kept versions that the person has looked at and settled with this one. */
    settles: z.array(recordId).max(50),
  })
  .refine(({ clientRef, sheet }) => clientRef === sheet.clientRef);
export type SyncRequest = z.infer<typeof SyncRequest>;

const StoredAnswer = z.object({ status: z.number(), body: z.unknown() });

/** What was stored as the answer to a message. */
export function storedAnswer(value: unknown) {
  return StoredAnswer.parse(value);
}

/** Two sheets are the same when their texts are: both go through the schema, so that their keys are in one order. */
export function isSameSheet(a: Worksheet, b: Worksheet) {
  return JSON.stringify(a) === JSON.stringify(b);
}
