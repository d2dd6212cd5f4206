import { axisWords, figureWords } from "./lane-strip-words.ts";
import { type Heap, type LaneStripSpec, marksPerHeap, stripParts, type StripSize } from "./lane-strip-spec.ts";
import { textWidthPx } from "./text-width.ts";

/** Everything measured in px of the strip's own drawing, x from the left, y from the top. */
export type StripLayout = {
  width: number;
  height: number;
  scale: number;
  laneTop: number;
  laneBottom: number;
  laneHeight: number;
  centreY: number;
  labelPx: number;
  x: (value: number) => number;
  ticks: { x: number; words: string | null; anchor: "start" | "middle" | "end" }[];
  band: { x1: number; x2: number; label: { x: number; anchor: "start" | "middle" | "end"; words: string } } | null;
  plate: { x1: number; x2: number; tickX: number; height: number; words: string } | null;
  interval: { x1: number; x2: number } | null;
  middleHalf: { x1: number; x2: number } | null;
  grains: { x: number; y: number }[];
  grainRadius: number;
  bars: { x1: number; x2: number; y1: number; y2: number }[];
  notches: number[];
  flag: FlagLayout | null;
  openEnds: { x: number; anchor: "start" | "end"; words: string }[];
  withheld: { x: number; words: string } | null;
};

export type FlagLayout = {
  x: number;
  flyX: number;
  isLeft: boolean;
  width: number;
  words: string;
  note: string | null;
};

const measures = {
  desk: { width: 888, laneHeight: 88, scale: 1, labelPx: 13.33 },
  phone: { width: 328, laneHeight: 116, scale: 1, labelPx: 13.33 },
  wall: { width: 1192, laneHeight: 88 * 1.9, scale: 1.9, labelPx: 28 },
} as const;

/** Below this width a strip is laid out as on a phone. */
export const phoneBelowPx = 600;
const centreShare = 0.43;
export const edgeInset = 4;
const flagTurnsAt = 0.62;

/** Where every part of the strip goes. Pure: the same spec, size and width give the same numbers. */
export function layOutStrip(spec: LaneStripSpec, size: StripSize, widthPx: number = measures[size].width): StripLayout {
  const { laneHeight, scale, labelPx } = measures[size];
  const parts = stripParts(spec, size);
  const { from, to } = spec.axis;
  const x = (value: number) => Math.min(Math.max((value - from) / (to - from), 0), 1) * widthPx;
  const shown = spec.peers.state === "shown" ? spec.peers : null;

  const flag = parts.hasFlag && spec.own !== null ? layOutFlag(spec, spec.own, x, widthPx) : null;
  const band = layOutBand(spec, x, widthPx, labelPx, flag);
  const laneTop =
    (flag === null ? 0 : 30) +
    (band === null
      ? flag === null
        ? 2
        : 0
      : 18 * scale + (flag === null || isUnderCloth(band, flag, labelPx) ? 4 : 0));
  const laneBottom = laneTop + laneHeight;
  const base = { x, widthPx, scale, labelPx, laneTop, laneBottom, laneHeight, size };
  const plate = shown === null ? null : layOutPlate(spec, base, flag);
  const interval = parts.hasInterval && shown?.interval ? shown.interval : null;
  const half = parts.hasMiddleHalf && shown?.middleHalf ? shown.middleHalf : null;

  const middleHalf = half === null ? null : { x1: x(half.low), x2: x(half.high) };
  const obstacles = {
    posts: [flag?.x, plate?.tickX].filter((post) => post !== undefined),
    areas: [band, middleHalf].filter((area) => area !== null),
  };

  return {
    width: widthPx,
    height: laneBottom + (size === "wall" ? 53 : 25.3),
    scale,
    laneTop,
    laneBottom,
    laneHeight,
    centreY: laneTop + centreShare * laneHeight,
    labelPx,
    x,
    ticks: layOutTicks(spec, x, widthPx, labelPx),
    band,
    plate,
    interval: interval === null ? null : { x1: x(interval.low), x2: x(interval.high) },
    middleHalf,
    ...layOutHeaps(spec, base),
    flag,
    openEnds: shown === null ? [] : layOutOpenEnds(spec, shown.heaps, base, obstacles),
    withheld: spec.peers.state === "withheld" ? layOutWithheld(spec.peers.reason, band, base) : null,
  };
}

/** The reason is painted on the near lane, beside the band where there is room, and in fewer words where there is little. */
function layOutWithheld(reason: string, band: StripLayout["band"], { widthPx, labelPx }: Base) {
  const stretches =
    band === null
      ? [[0, widthPx]]
      : [
          [band.x2, widthPx],
          [0, band.x1],
        ];
  for (const words of [`peers hidden: ${reason}`, reason]) {
    for (const [from = 0, to = 0] of stretches) {
      if (to - from >= textWidthPx(words, labelPx) + 16) return { x: (from + to) / 2, words };
    }
  }
  return { x: widthPx / 2, words: reason };
}

type Base = {
  x: (value: number) => number;
  widthPx: number;
  scale: number;
  labelPx: number;
  laneTop: number;
  laneBottom: number;
  laneHeight: number;
  size: StripSize;
};

function layOutTicks({ axis, unit }: LaneStripSpec, x: Base["x"], widthPx: number, labelPx: number) {
  const firstStep = Math.ceil(axis.from / axis.step - 1e-9);
  const lastStep = Math.floor(axis.to / axis.step + 1e-9);
  const values = Array.from({ length: Math.max(0, lastStep - firstStep + 1) }, (_, i) => (firstStep + i) * axis.step);
  const widest = Math.max(0, ...values.map((value) => textWidthPx(axisWords(value, { axis, unit }), labelPx)));
  const everyNth = Math.max(1, Math.ceil((widest + 14) / Math.max(1, x(axis.from + axis.step))));
  return values.map((value, i) => {
    const atX = x(value);
    const words = (firstStep + i) % everyNth === 0 ? axisWords(value, { axis, unit }) : null;
    const half = words === null ? 0 : textWidthPx(words, labelPx) / 2;
    const anchor = atX < half ? ("start" as const) : atX > widthPx - half ? ("end" as const) : ("middle" as const);
    return { x: atX, words, anchor };
  });
}

/** The label keeps inside the strip and steps aside for the pole of our flag. */
function layOutBand(spec: LaneStripSpec, x: Base["x"], widthPx: number, labelPx: number, flag: FlagLayout | null) {
  const { band, axis } = spec;
  if (band === null || band.low >= axis.to || band.high <= axis.from) return null;
  const x1 = x(band.low);
  const x2 = x(band.high);
  const wide = textWidthPx(band.label, labelPx);
  const middle = Math.min(Math.max((x1 + x2) / 2, wide / 2), widthPx - wide / 2);
  const clear = 8;
  if (flag === null || Math.abs(flag.x - middle) > wide / 2 + clear) {
    return { x1, x2, label: { x: middle, anchor: "middle" as const, words: band.label } };
  }
  const isRoomLeft = flag.x - clear - wide >= 0;
  const isLeft = isRoomLeft && (flag.x >= middle || flag.x + clear + wide > widthPx);
  const label = isLeft
    ? { x: flag.x - clear, anchor: "end" as const, words: band.label }
    : { x: flag.x + clear, anchor: "start" as const, words: band.label };
  return { x1, x2, label };
}

/** Whether the band's label stands below the cloth of our flag, so that it needs air above. */
function isUnderCloth({ label }: NonNullable<StripLayout["band"]>, flag: FlagLayout, labelPx: number) {
  const wide = textWidthPx(label.words, labelPx);
  const left = label.x - { start: 0, middle: wide / 2, end: wide }[label.anchor];
  return left < Math.max(flag.x, flag.flyX) && left + wide > Math.min(flag.x, flag.flyX);
}

function layOutFlag(spec: LaneStripSpec, own: NonNullable<LaneStripSpec["own"]>, x: Base["x"], widthPx: number) {
  const { from, to } = spec.axis;
  const label = own.label === "" ? figureWords(own.value, spec) : own.label;
  const words = own.value > to ? `${label} ›` : own.value < from ? `‹ ${label}` : label;
  const flagPx = textWidthPx(words, 16, true) + 24;
  const inset = 5;
  const atX = Math.min(Math.max(x(own.value), inset), widthPx - inset);
  const isLeft = atX > flagTurnsAt * widthPx;
  const flyX = isLeft ? atX + 2 - flagPx : atX - 2 + flagPx;
  const room = isLeft ? flyX - 8 : widthPx - flyX - 8;
  const notes = [own.note, own.shortNote ?? ""].filter((words) => words !== "");
  const note = notes.find((words) => textWidthPx(words, 14.4) <= room) ?? null;
  return { x: atX, flyX, isLeft, width: flagPx, words, note };
}

/** The plate stands in the break of the centre line, under its tick; it moves aside when our stake needs the place. */
function layOutPlate(spec: LaneStripSpec, base: Base, flag: FlagLayout | null) {
  if (spec.peers.state === "withheld") return null;
  const { median, medianWords } = spec.peers;
  const figure = figureWords(median, spec);
  const words = base.size === "phone" ? figure : (medianWords ?? `median ${figure}`);
  const wide = textWidthPx(words, base.labelPx, true) + 14 * base.scale;
  const tickX = base.x(median);
  const reach = wide / 2;
  const inside = (at: number) => Math.min(Math.max(at, reach + 4), base.widthPx - reach - 4);
  const clear = reach + 12;
  const places = flag === null ? [tickX] : [tickX, flag.x - clear, flag.x + clear];
  const middle =
    places
      .map((place) => inside(place))
      .filter((place) => flag === null || Math.abs(place - flag.x) >= clear - 1)
      .sort((a, b) => Math.abs(a - tickX) - Math.abs(b - tickX))[0] ?? inside(tickX);
  return { x1: middle - wide / 2, x2: middle + wide / 2, tickX, height: plateHeightPx(base.size), words };
}

function plateHeightPx(size: StripSize) {
  return size === "wall" ? 43.7 : 20.8;
}

function layOutHeaps(spec: LaneStripSpec, base: Base) {
  const empty = { grains: [], grainRadius: 0, bars: [], notches: [] };
  if (spec.peers.state === "withheld" || spec.peers.heaps.length === 0) return empty;
  const { heaps } = spec.peers;
  const { heaps: kind } = stripParts(spec, base.size);
  const counts = marksPerHeap(spec, base.size);
  const centres = heaps.map((_, position) => heapCentre(heaps, position, spec, base));
  const gaps = centres.slice(1).map((centre, position) => centre - (centres[position] ?? 0));
  const narrowest = Math.max(6, Math.min(base.widthPx, ...gaps));
  const borders = [...new Set(heaps.flatMap((heap) => [heap.from, heap.to]))].filter((border) => border !== null);
  const notches = borders.filter((border) => border > spec.axis.from && border < spec.axis.to).map(base.x);

  if (kind === "grains") {
    const tight = Math.min(1, narrowest / 38);
    const grainRadius = 4.2 * tight;
    const grains = heaps.flatMap((_, i) =>
      heapOfGrains(centres[i] ?? 0, counts[i] ?? 0, 10.5 * tight, base.laneBottom - 7.5 - grainRadius),
    );
    return { ...empty, grains, grainRadius, notches };
  }
  // From the foot of the heaps up to the lower edge of the plate, which no bar may touch.
  const roomPx = base.laneHeight * (1 - centreShare) - (edgeInset + 5) * base.scale - plateHeightPx(base.size) / 2;
  const pitch = Math.min(12.35 * base.scale, roomPx / Math.max(1, ...counts));
  const halfWidth = Math.min(narrowest - 3 * base.scale, 35 * base.scale) / 2;
  const foot = base.laneBottom - (edgeInset + 3) * base.scale;
  const bars = heaps.flatMap((_, i) =>
    Array.from({ length: counts[i] ?? 0 }, (__, row) => ({
      x1: (centres[i] ?? 0) - halfWidth,
      x2: (centres[i] ?? 0) + halfWidth,
      y1: foot - row * pitch - pitch * 0.78,
      y2: foot - row * pitch,
    })),
  );
  return { ...empty, bars, notches };
}

/** Rows of three, an unfinished top row centred. */
function heapOfGrains(centreX: number, count: number, pitch: number, footY: number) {
  return Array.from({ length: count }, (_, i) => {
    const row = Math.floor(i / 3);
    const inRow = Math.min(3, count - row * 3);
    return { x: centreX + ((i % 3) - (inRow - 1) / 2) * pitch, y: footY - row * pitch };
  });
}

/** The middle of a closed bin. An open one stands by its inner border, as wide as its neighbour: it says nothing of the extreme. */
function heapCentre(heaps: readonly Heap[], position: number, spec: LaneStripSpec, base: Base) {
  const heap = heaps[position];
  if (heap === undefined) return 0;
  if (heap.from !== null && heap.to !== null) return base.x((heap.from + heap.to) / 2);
  const neighbour = heap.from === null ? heaps[position + 1] : heaps[position - 1];
  const isClosed = neighbour !== undefined && neighbour.from !== null && neighbour.to !== null;
  const span = isClosed ? (neighbour.to ?? 0) - (neighbour.from ?? 0) : spec.axis.step;
  const reach = Math.min(base.x(spec.axis.from + span) / 2, 24 * base.scale);
  const centre = heap.from === null ? base.x(heap.to ?? spec.axis.from) - reach : base.x(heap.from) + reach;
  return Math.min(Math.max(centre, 18), base.widthPx - 18);
}

/**
 * "‹ 220 and less" and "400 and more ›" in the far lane. Shorter where the band or a track lies under them, and left out
 * where a stake or the tick stands in the way.
 */
function layOutOpenEnds(spec: LaneStripSpec, heaps: readonly Heap[], base: Base, obstacles: Obstacles) {
  const pad = 8 * base.scale;
  const ends: StripLayout["openEnds"] = [];
  const first = heaps[0];
  if (first !== undefined && first.from === null && first.to !== null) {
    const figure = figureWords(first.to, spec);
    const words = fitting(`‹ ${figure} and less`, `‹ ${figure}`, (wide) => [pad, pad + wide], base, obstacles);
    if (words !== null) ends.push({ x: pad, anchor: "start", words });
  }
  const last = heaps.at(-1);
  if (last !== undefined && last.to === null && last.from !== null) {
    const figure = figureWords(last.from, spec);
    const right = base.widthPx - pad;
    const words = fitting(`${figure} and more ›`, `${figure} ›`, (wide) => [right - wide, right], base, obstacles);
    if (words !== null) ends.push({ x: right, anchor: "end", words });
  }
  return ends;
}

type Obstacles = { posts: readonly number[]; areas: readonly { x1: number; x2: number }[] };

function fitting(
  full: string,
  short: string,
  place: (wide: number) => [number, number],
  base: Base,
  obstacles: Obstacles,
) {
  const isClear = (words: string, areas: Obstacles["areas"]) => {
    const [x1, x2] = place(textWidthPx(words, base.labelPx));
    const isOffPosts = obstacles.posts.every((x) => x < x1 - 7 || x > x2 + 7);
    return isOffPosts && areas.every((area) => area.x2 < x1 - 4 || area.x1 > x2 + 4);
  };
  if (isClear(full, obstacles.areas)) return full;
  return isClear(short, []) ? short : null;
}
