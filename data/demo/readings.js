const settingCount = 8;
const countSeconds = 60;

/**
 * How one truck's shaft turns and how much leaves it at a turn, such that at its working setting it lays
 * `rateLbPerLaneMile` of salt on a lane mile.
 *
 * The arithmetic is the trade's, read backwards: lb/min = rate · mph · lanes / 60, and lb/min = rev/min · lb/rev.
 */
export function mechanicsFor(random, truck, rateLbPerLaneMile) {
  const lbPerMin = (rateLbPerLaneMile * truck.working_speed_mph * truck.lanes_per_pass) / 60;
  const wantedRevPerMin = truck.working_setting * random.between(6, 10);
  const lbPerRev = Math.max(2, Math.min(13, lbPerMin / wantedRevPerMin));
  const limited = random.chance(0.18);
  return {
    lbPerRev,
    revPerMinPerSetting: lbPerMin / lbPerRev / truck.working_setting,
    bend: random.between(-0.06, 0.06),
    // From this setting on the hydraulics give no more: the count stays where it was.
    limitSetting: limited ? random.integer(Math.max(5, truck.working_setting + 1), 7) : null,
    gateSixteenths: random.integer(26, 42),
    catchTurns: lbPerRev < 4 ? random.pick([5, 6, 8]) : random.pick([3, 4, 5]),
    tareLb: Math.round(random.between(2, 6) * 10) / 10,
  };
}

/** Whole quarter turns of the shaft in a minute, setting by setting. `pace` is how fast the oil runs that day. */
export function countRows(mechanics, truck, pace) {
  const reached = mechanics.limitSetting === null ? settingCount : mechanics.limitSetting - 1;
  return Array.from({ length: settingCount }, (_, index) => {
    const setting = index + 1;
    const turning = Math.min(setting, reached);
    const bend = 1 + (mechanics.bend * (turning - truck.working_setting)) / settingCount;
    const revPerMin = mechanics.revPerMinPerSetting * turning * bend * pace;
    return { setting, revolutions: Math.round(revPerMin * 4) / 4, seconds: countSeconds, rpm: truck.working_rpm };
  });
}

/** Catches weighed to a tenth of a pound; `scatter` holds one factor for each. */
export function catchRows(mechanics, lbPerRev, scatter) {
  return scatter.map((factor, index) => {
    const netLb = lbPerRev * mechanics.catchTurns * factor;
    return {
      position: index + 1,
      revolutions: mechanics.catchTurns,
      gross_lb: Math.round((mechanics.tareLb + netLb) * 10) / 10,
      tare_lb: mechanics.tareLb,
    };
  });
}

/** Three catches as a rule; they repeat within a few percent, in a few yards not even within ten. */
export function catchScatter(random) {
  const catchCount = random.pick([3, 3, 3, 3, 3, 3, 3, 3, 4, 2, 1]);
  const variation = random.chance(0.06) ? 0.12 : random.between(0.01, 0.06);
  return Array.from({ length: catchCount }, () => 1 + variation * random.normal());
}
