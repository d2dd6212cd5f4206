import { useEffect, useRef, useState } from "react";

/** One short tone. Made on the spot: no file to fetch, and silence where the browser has no sound. */
function beep() {
  if (!("AudioContext" in window)) return;
  const audio = new AudioContext();
  const tone = audio.createOscillator();
  const volume = audio.createGain();
  volume.gain.value = 0.4;
  tone.frequency.value = 880;
  tone.connect(volume).connect(audio.destination);
  tone.start();
  tone.stop(audio.currentTime + 0.9);
  tone.addEventListener("ended", () => void audio.close());
}

/**
 * Seconds gone since `startedAtMs`, four times a second, up to `seconds`; at the end the phone shakes, and sounds when
 * it may.
 *
 * @param startedAtMs - null while nothing runs
 */
export function useCountdown(startedAtMs: number | null, seconds: number, hasSound: boolean): number {
  const [goneSeconds, setGone] = useState(0);
  const sound = useRef(hasSound);
  useEffect(() => {
    sound.current = hasSound;
  }, [hasSound]);

  useEffect(() => {
    if (startedAtMs === null) return;
    // A page that is opened again after the end shows the end, and does not announce it a second time.
    let isAnnounced = Date.now() - startedAtMs > seconds * 1000;
    const tick = () => {
      const gone = Math.min(seconds, (Date.now() - startedAtMs) / 1000);
      setGone(gone);
      if (gone < seconds || isAnnounced) return;
      isAnnounced = true;
      if ("vibrate" in navigator) navigator.vibrate([300, 120, 300]);
      if (sound.current) beep();
    };
    const timer = setInterval(tick, 250);
    const frame = requestAnimationFrame(tick);
    return () => {
      clearInterval(timer);
      cancelAnimationFrame(frame);
    };
  }, [startedAtMs, seconds]);

  return startedAtMs === null ? 0 : goneSeconds;
}
