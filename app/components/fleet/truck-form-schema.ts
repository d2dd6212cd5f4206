import { z } from "zod";
import { controlKinds, longestBody, longestUnitNumber, spreaderKinds, truckLimits } from "#app/domain/fleet/truck.ts";
import { typedInches, typedNumber } from "#app/lib/typed-figures.ts";

const orNull = <Schema extends z.ZodType>(schema: Schema) => schema.optional().transform((value) => value ?? null);

/** One truck as a form sends it. Materials come beside it, by `readMaterials`. */
export const TruckFormSchema = z.object({
  version: z.string().optional(),
  unitNumber: z
    .string({ error: "Give the unit number." })
    .trim()
    .min(1, "Give the unit number.")
    .max(longestUnitNumber, `At most ${longestUnitNumber} characters.`),
  body: z
    .string()
    .trim()
    .max(longestBody, `At most ${longestBody} characters.`)
    .optional()
    .transform((text) => text ?? ""),
  spreaderKind: z.enum(spreaderKinds, "Choose the spreader."),
  control: z.enum(controlKinds, "Choose how the rate is kept."),
  lanesPerPass: typedNumber(truckLimits.lanesPerPass),
  workingSpeedMph: typedNumber(truckLimits.workingSpeedMph),
  workingSetting: typedNumber(truckLimits.workingSetting),
  workingRpm: orNull(typedNumber(truckLimits.workingRpm)),
  gateMaxIn: orNull(typedInches(truckLimits.gateMaxIn)),
  capacityTons: orNull(typedNumber(truckLimits.capacityTons)),
  isInService: z
    .literal("yes")
    .optional()
    .transform((value) => value === "yes"),
});

export type TypedMaterial = { materialId: number; isCarried: boolean; since: string };

/** The materials as they were ticked and dated. `known` are the town's; anything else is passed over. */
export function readMaterials(form: FormData, known: readonly { id: number }[]): TypedMaterial[] {
  return known.map(({ id }) => {
    const since = form.get(`since-${id}`);
    return {
      materialId: id,
      isCarried: form.get(`material-${id}`) === "yes",
      since: typeof since === "string" ? since.trim() : "",
    };
  });
}
