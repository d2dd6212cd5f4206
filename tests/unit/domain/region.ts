import type { TownInput } from "#app/domain/peers/edition.ts";

/** Numbers from 0 to 1, the same for the same seed (the mulberry32 generator, public domain). */
export function seededRandom(seed: number): () => number {
  let state = seed >>> 0;
  return () => {
    state = (state + 0x6d2b79f5) >>> 0;
    let mixed = Math.imul(state ^ (state >>> 15), state | 1);
    mixed ^= mixed + Math.imul(mixed ^ (mixed >>> 7), mixed | 61);
    return ((mixed ^ (mixed >>> 14)) >>> 0) / 4_294_967_296;
  };
}

/** A figure that is never within 1 of a multiple of 10, so that a published one cannot be it by chance. */
function unround(value: number, random: () => number) {
  return Math.floor(value / 10) * 10 + 1 + 8 * random();
}

const sizes = [
  { towns: 12, from: 12, to: 49 },
  { towns: 24, from: 50, to: 149 },
  { towns: 20, from: 150, to: 399 },
  { towns: 9, from: 400, to: 900 },
];

/**
 * An invented region of 65 towns. "Far Shore" holds eight of the nine largest towns and three of the next size, so it
 * differs from the size group by one town on one side; the other districts lie across the sizes.
 */
export function inventedRegion(seed = 11): TownInput[] {
  const random = seededRandom(seed);
  const others = ["Upper Fold", "Lower Fold", "Ridge"];
  return sizes.flatMap((size, sizePlace) =>
    Array.from({ length: size.towns }, (_, place): TownInput => {
      const townId = 100 * (sizePlace + 1) + place;
      const isFarShore = (sizePlace === 3 && place < 8) || (sizePlace === 2 && place < 3);
      const rate = 180 + 380 * random() ** 1.5;
      return {
        townId,
        contributorId: townId,
        district: isFarShore ? "Far Shore" : (others[place % 3] ?? "Ridge"),
        laneMiles: Math.round(size.from + (size.to - size.from) * random()),
        values: {
          "rate-at-working-setting": unround(rate, random),
          "salt-per-event": unround(rate * (0.75 + 0.5 * random()), random),
        },
      };
    }),
  );
}
