/** How a winter gathered its points, day by day, beside how the station's winters usually do. Days count from 1 July. */
export type BuildUpSpec = {
  days: { dayOfSeason: number; totalPoints: number; snowPoints: number; isMissing: boolean }[];
  usual: { dayOfSeason: number; lowPoints: number; medianPoints: number; highPoints: number }[] | null;
  /** Stands at the line's end. */
  endWords: string;
  sentence: string;
};

/** First days of the months a winter spans, in days of the season; a leap day moves the later ones by one. */
export const monthStarts = [
  { dayOfSeason: 93, label: "Oct" },
  { dayOfSeason: 124, label: "Nov" },
  { dayOfSeason: 154, label: "Dec" },
  { dayOfSeason: 185, label: "Jan" },
  { dayOfSeason: 216, label: "Feb" },
  { dayOfSeason: 244, label: "Mar" },
  { dayOfSeason: 275, label: "Apr" },
  { dayOfSeason: 305, label: "May" },
] as const;
