/** Who a protected figure is for: a member's own screen, a workshop's wall, the public download. */
export type Audience = "member" | "wall" | "download";

/** Every number that decides what may be shown. It is stored with each edition. */
export type DisclosurePolicy = {
  /** Fewest contributors behind any figure, the viewer included. */
  kMin: Record<Audience, number>;
  /** Fewest contributors for the median's interval. */
  intervalFrom: number;
  /** Fewest contributors for quartiles, bins and a town's own place. */
  quartilesFrom: number;
  /** Fewest contributors for the 10th and 90th percentile. */
  decilesFrom: number;
  /** Two published groups differ by nobody or by at least so many, on each side. */
  minimumDifference: number;
  /** A sum is unsafe when the second largest could tell the largest to within so many percent. Never published. */
  pPercent: number;
  townsPerBin: number;
  /** Figures in lb are published in multiples of this. */
  roundingBaseLb: number;
  significantDigits: number;
  /** A town's own place is given in steps of so many of 100. */
  placeStep: number;
  /** Lower ends of the bands that stand for a number of towns; the first is also the fewest that is banded. */
  townBands: readonly number[];
  /** Inner borders of the lane mile bands. */
  laneMileBands: readonly number[];
  /** What the file of single rows needs before it is given out. */
  rowFile: { networkMin: number; k: number; l: number; spreadShare: number };
};

/**
 * The policy in force from the first day. The numbers are the network's own choice between the limits that statistical
 * offices use (3, 5 and 10 contributors).
 *
 * Source of the rules: Handbook on Statistical Disclosure Control, Hundepool and others (ESSnet), chapters 3 to 5.
 */
export const defaultPolicy: DisclosurePolicy = {
  kMin: { member: 6, wall: 10, download: 10 },
  intervalFrom: 9,
  quartilesFrom: 12,
  decilesFrom: 30,
  minimumDifference: 5,
  pPercent: 10,
  townsPerBin: 3,
  roundingBaseLb: 10,
  significantDigits: 3,
  placeStep: 5,
  townBands: [10, 15, 25, 50],
  laneMileBands: [50, 150, 400],
  rowFile: { networkMin: 50, k: 5, l: 3, spreadShare: 0.2 },
};

/**
 * The policy as it may be read by anyone: all of it but p, which would help to compute a hidden figure.
 *
 * @example "pPercent" in publicPolicy(defaultPolicy) // false
 */
export function publicPolicy(policy: DisclosurePolicy): Omit<DisclosurePolicy, "pPercent"> {
  const { pPercent, ...open } = policy;
  void pPercent; // named only to be left out
  return open;
}
