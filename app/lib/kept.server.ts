/**
 * Remember what a read returned, for things that never change once they are there.
 *
 * @param most - how many to remember; the one read longest ago goes first
 * @param read - reads one by its key
 * @param isWhole - whether what was read may be remembered; something still being written may not
 * @returns reads by key, each once; a failed read is not remembered
 */
export function keepLast<Key extends string, Value>(
  most: number,
  read: (key: Key) => Promise<Value>,
  isWhole: (value: Value) => boolean,
): (key: Key) => Promise<Value> {
  const kept = new Map<Key, Promise<Value>>();
  return (key) => {
    const known = kept.get(key);
    if (known) return known;
    const reading = read(key);
    kept.set(key, reading);
    const forget = () => kept.delete(key);
    reading.then((value) => {
      if (!isWhole(value)) forget();
    }, forget);
    const oldest = kept.keys().next().value;
    if (kept.size > most && oldest !== undefined) kept.delete(oldest);
    return reading;
  };
}
