import { useEffect, useState } from "react";
import { Button } from "#app/components/ui/button.tsx";

/** Opens the browser's own print window. Without script it is not there, and the words beside it say how. */
export function PrintButton({ children }: { children: string }) {
  const [isAlive, setAlive] = useState(false);
  useEffect(() => {
    const frame = requestAnimationFrame(() => setAlive(true));
    return () => cancelAnimationFrame(frame);
  }, []);
  if (!isAlive) return null;
  return (
    <Button type="button" onClick={() => window.print()}>
      {children}
    </Button>
  );
}
