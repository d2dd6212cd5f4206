/**
 * Numbers that look random and are the same on every machine for the same seed and labels.
 *
 * Labels give every town and truck a stream of its own: a change in one part does not reshuffle the others.
 * The generator is mulberry32 (public domain); the labels are folded in with 32-bit FNV-1a.
 *
 * @param {number} seed - whole number
 * @param {...(string | number)} labels
 */
export function createRandom(seed, ...labels) {
  let state = foldLabels([seed, ...labels].join("|"));

  /** At least 0, below 1. */
  function uniform() {
    state = (state + 0x6d2b79f5) >>> 0;
    let mixed = Math.imul(state ^ (state >>> 15), state | 1);
    mixed = (mixed + Math.imul(mixed ^ (mixed >>> 7), mixed | 61)) ^ mixed;
    return ((mixed ^ (mixed >>> 14)) >>> 0) / 2 ** 32;
  }
  function between(low, high) {
    return low + (high - low) * uniform();
  }
  /** Both ends included. */
  function integer(low, high) {
    return low + Math.floor(uniform() * (high - low + 1));
  }
  /** Box and Muller's transform, cut at three deviations: the demo holds no freak that nobody planted. */
  function normal(mean = 0, deviation = 1) {
    const z = Math.sqrt(-2 * Math.log(1 - uniform())) * Math.cos(2 * Math.PI * uniform());
    return mean + deviation * Math.max(-3, Math.min(3, z));
  }
  function chance(share) {
    return uniform() < share;
  }
  function pick(list) {
    return list[integer(0, list.length - 1)];
  }
  function shuffled(list) {
    const copy = [...list];
    for (let last = copy.length - 1; last > 0; last -= 1) {
      const other = integer(0, last);
      [copy[last], copy[other]] = [copy[other], copy[last]];
    }
    return copy;
  }
  /** Version 4 in form, so that it passes for an id made on a phone. */
  function uuid() {
    const hex = Array.from({ length: 32 }, () => integer(0, 15).toString(16));
    hex[12] = "4";
    hex[16] = pick(["8", "9", "a", "b"]);
    const text = hex.join("");
    return [text.slice(0, 8), text.slice(8, 12), text.slice(12, 16), text.slice(16, 20), text.slice(20)].join("-");
  }

  return { uniform, between, integer, normal, chance, pick, shuffled, uuid };
}

function foldLabels(text) {
  let hash = 0x811c9dc5;
  for (let index = 0; index < text.length; index += 1) {
    hash = Math.imul(hash ^ text.charCodeAt(index), 0x01000193) >>> 0;
  }
  return hash;
}
