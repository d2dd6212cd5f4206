import type { Finding } from "#app/domain/finding.ts";

/** What the checks found, errors first, as sentences. */
export function FindingsList({ findings }: { findings: readonly Finding[] }) {
  const sorted = [...findings].sort((a, b) => Number(b.severity === "error") - Number(a.severity === "error"));
  return (
    <ul className="mt-2 max-w-method">
      {sorted.map(({ code, severity, message }) => (
        <li key={`${code} ${message}`} className="border-b border-rule py-2.5">
          <b className={severity === "error" ? "text-rust" : ""}>
            {severity === "error" ? "Cannot stand: " : "Please check: "}
          </b>
          {message}
        </li>
      ))}
    </ul>
  );
}
