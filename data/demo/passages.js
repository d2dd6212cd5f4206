import { addDays } from "./calendar.js";
import { createRandom } from "./random.js";

/** Amounts as a version keeps them: the columns' names as the application knows them. */
function contentOf(figure) {
  return {
    laneMiles: figure.lane_miles,
    eventCount: figure.event_count,
    saltLb: figure.salt_lb,
    mixLb: figure.mix_lb,
    mixSaltShare: figure.mix_salt_share,
    sandLb: figure.sand_lb,
    brineGal: figure.brine_gal,
    materialCostCents: figure.material_cost_cents,
    laneMilesTreated: figure.lane_miles_treated,
    wettedSaltLb: figure.wetted_salt_lb,
    stockUsedLb: figure.stock_used_lb,
    stockLoggedLb: figure.stock_logged_lb,
  };
}

const slips = [
  {
    field: "saltLb",
    note: "This is half of last year’s, and the winter was no milder. Is a yard missing?",
    before: (content) => ({ ...content, saltLb: Math.round(content.saltLb / 400) * 200 }),
  },
  {
    field: "eventCount",
    note: "Are these call-outs? The towns around you had about half as many storms.",
    before: (content) => ({ ...content, eventCount: content.eventCount * 2 }),
  },
  {
    field: "laneMiles",
    note: "Please count lanes, not road miles.",
    before: (content) => ({ ...content, laneMiles: Math.round(content.laneMiles * 5) / 10 }),
  },
];

/**
 * What was sent, and sent again: a version for every figure; about one in sixteen of the accepted ones was sent back
 * once and revised. The one that stands returned carries notes on its fields.
 *
 * @returns {{ figures: object[], figure_version: object[], figure_note: object[] }} figures with the version they are at
 */
export function makePassages(seed, figures) {
  const figure_version = [];
  const figure_note = [];
  const revised = figures.map((figure) => {
    const random = createRandom(seed, "passage", figure.town_id, figure.season_start_year);
    const content = contentOf(figure);
    const sent = (version, at, what) =>
      figure_version.push({
        figure_id: figure.id,
        version,
        content: JSON.stringify(what),
        sent_at: at,
        sent_by_id: figure.sent_by_id,
      });
    if (figure.state === "accepted" && random.chance(0.06)) {
      const slip = random.pick(slips);
      sent(2, `${addDays(figure.sent_at.slice(0, 10), -4)} 15:10:00.000`, slip.before(content));
      figure_note.push({ figure_id: figure.id, version: 2, field: slip.field, note: slip.note });
      sent(4, figure.sent_at, content);
      return { ...figure, version: 5 };
    }
    sent(2, figure.sent_at, content);
    if (figure.state === "returned") {
      figure_note.push({
        figure_id: figure.id,
        version: 2,
        field: "sandLb",
        note: "Does this include the pile at the north yard?",
      });
    }
    return figure;
  });
  return { figures: revised, figure_version, figure_note };
}
