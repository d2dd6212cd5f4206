import { randomBytes } from "node:crypto";
import { existsSync, readFileSync, writeFileSync } from "node:fs";
import { join } from "node:path";

/** @typedef {{ sub: string, name: string, email: string, role: string | null, town: string | null }} Person */

/**
 * Everybody who can sign in here: the demo people, and those who have entered a name and an e-mail address.
 *
 * @param {{ folder: string, hasDemoPeople: boolean }} given folder: where the second kind is kept
 */
export function peopleOf({ folder, hasDemoPeople }) {
  const file = join(folder, "people.json");
  /** @type {Person[]} */
  const demo = hasDemoPeople ? JSON.parse(readFileSync(new URL("accounts.json", import.meta.url), "utf8")) : [];
  /** @type {Person[]} */
  const registered = existsSync(file) ? JSON.parse(readFileSync(file, "utf8")) : [];

  return {
    demo: () => demo,
    registered: () => registered,
    /** @param {unknown} sub @returns {Person | undefined} */
    find: (sub) => [...demo, ...registered].find((person) => person.sub === sub),
    /**
     * @param {{ name: string, email: string }} given
     * @returns {{ person: Person } | { problem: string }} the same person again for an address already known
     */
    register(given) {
      const name = given.name.replace(/\s+/g, " ").trim();
      const email = given.email.trim().toLowerCase();
      if (name === "" || name.length > 120) return { problem: "Enter a name of 1 to 120 characters." };
      if (email.length > 254 || !/^[\w.+-]+@[a-z0-9-]+(\.[a-z0-9-]+)+$/.test(email)) {
        return { problem: "Enter an e-mail address such as name@town.example." };
      }
      const known = [...demo, ...registered].find((person) => person.email === email);
      if (known) return { person: known };
      const person = { sub: `p-${randomBytes(8).toString("hex")}`, name, email, role: null, town: null };
      registered.push(person);
      writeFileSync(file, JSON.stringify(registered, null, 2), { mode: 0o600 });
      return { person };
    },
  };
}
