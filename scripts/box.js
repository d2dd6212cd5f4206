/**
 * Lines in a frame as wide as the longest of them.
 *
 * @param {readonly string[]} lines plain text; an empty line is a gap
 * @returns {string} the frame, ending without a line break
 * @example box(["ab"]) // "┌────┐\n│ ab │\n└────┘"
 */
export function box(lines) {
  const width = Math.max(0, ...lines.map((line) => [...line].length));
  const rule = "─".repeat(width + 2);
  const rows = lines.map((line) => `│ ${line}${" ".repeat(width - [...line].length)} │`);
  return [`┌${rule}┐`, ...rows, `└${rule}┘`].join("\n");
}

/**
 * What a person needs once everything answers.
 *
 * @param {object} given
 * @param {string} given.origin the application's address
 * @param {string} given.mailOrigin the mail page's address
 * @param {readonly { sub: string, name: string, role: string, town: string | null }[]} given.people empty without the demo
 * @param {string | null} given.invitationUrl for the first coordinator of an empty network
 * @returns {string[]}
 */
export function welcomeLines({ origin, mailOrigin, people, invitationUrl }) {
  const lines = ["Commonweigh is running.", "", `Open       ${origin}`, `Mail page  ${mailOrigin}`];
  if (people.length > 0) {
    const titles = people.map(({ name, role, town }) => `${name}, ${role}${town === null ? "" : ` of ${town}`}`);
    const width = Math.max(...titles.map((title) => title.length));
    lines.push("", "Sign in as one of the demo people:");
    people.forEach(({ sub }, at) => {
      lines.push(`  ${(titles[at] ?? "").padEnd(width)}  ${origin}/auth/start?hint=${encodeURIComponent(sub)}`);
    });
  }
  if (invitationUrl !== null) {
    lines.push(
      "",
      "This network is empty. Its first coordinator comes in here, once, within 7 days:",
      `  ${invitationUrl}`,
    );
  }
  lines.push("", "Stop: Ctrl-C");
  return lines;
}
