const columnCount = 4;
const stepMph = 5;

/**
 * The speeds of a cab card: the working speed, two round ones below it, and round ones above until there are four.
 *
 * @param workingSpeedMph - > 0
 * @returns ascending mph, each at least 5 save for a slower working speed
 * @throws RangeError when the speed is not above 0
 * @example cardSpeeds(25) // [15, 20, 25, 30]
 */
export function cardSpeeds(workingSpeedMph: number): number[] {
  if (!(workingSpeedMph > 0)) throw new RangeError(`the working speed must be above 0 mph, not ${workingSpeedMph}`);
  const below = (Math.ceil(workingSpeedMph / stepMph) - 1) * stepMph;
  const speeds = [below - stepMph, below].filter((speed) => speed >= stepMph);
  speeds.push(workingSpeedMph);
  const above = (Math.floor(workingSpeedMph / stepMph) + 1) * stepMph;
  for (let speed = above; speeds.length < columnCount; speed += stepMph) speeds.push(speed);
  return speeds;
}
