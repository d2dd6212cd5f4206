/**
 * The fleet of the walk-through. Its working rates are written down, not drawn, so that the scenario can say them:
 * a median of 388 lb per lane mile at 25 mph and no truck in the band. In autumn 2026 half the fleet has been weighed;
 * trucks 4, 9 and 12 are in the calibration file to upload, truck 15 stays due.
 */
export const quillbrook = "Quillbrook";
export const quillbrookSpeedMph = 25;

export const quillbrookTrucks = [
  { unit: "4", setting: 3, rates: { 2023: 361, 2024: 357, 2025: 352 } },
  { unit: "7", setting: 4, rates: { 2022: 371, 2023: 374, 2024: 369, 2025: 366, 2026: 364 } },
  { unit: "9", setting: 4, rates: { 2022: 366, 2024: 368, 2025: 371 } },
  { unit: "11", setting: 3, rates: { 2022: 392, 2023: 388, 2024: 386, 2025: 383, 2026: 384 } },
  { unit: "12", setting: 3, rates: { 2022: 474, 2023: 470, 2024: 467, 2025: 463 } },
  { unit: "14", setting: 5, rates: { 2023: 401, 2024: 397, 2025: 393, 2026: 392 } },
  { unit: "15", setting: 4, rates: { 2022: 405, 2024: 409, 2025: 412 } },
  { unit: "18", setting: 3, rates: { 2022: 449, 2023: 445, 2024: 441, 2025: 436, 2026: 431 } },
];

/** What was used in 2025-26, as the season file to upload has it. The piles know; the storms come with their own file. */
export const quillbrookLastSeason = {
  lane_miles: 118,
  event_count: 26,
  salt_lb: 1_208_000,
  mix_lb: 295_800,
  mix_salt_share: 0.2,
  sand_lb: 0,
  brine_gal: null,
  material_cost_cents: 4_849_000,
};
