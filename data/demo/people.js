import { familyNames, givenNames } from "./names.js";
import { createRandom } from "./random.js";

const cast = [
  { subject: "ilse.tarrant", name: "Ilse Tarrant", role: "coordinator", town: null },
  { subject: "ruben.vale", name: "Ruben Vale", role: "analyst", town: null },
  { subject: "dell.farrow", name: "Dell Farrow", role: "recorder", town: "Quillbrook" },
  { subject: "maren.oake", name: "Maren Oake", role: "director", town: "Quillbrook" },
  { subject: "tobin.ashe", name: "Tobin Ashe", role: "recorder", town: "Fallowmere" },
  { subject: "hester.lund", name: "Hester Lund", role: "director", town: "Fallowmere" },
];

/** The six people who can sign in, then one director for every other town, so that every figure has a sender. */
export function makePeople(seed, towns) {
  const random = createRandom(seed, "people");
  const pairs = random.shuffled(givenNames.flatMap((given) => familyNames.map((family) => `${given} ${family}`)));
  const idByTown = new Map(towns.map((town) => [town.row.name, town.row.id]));
  const played = new Set(cast.map((person) => person.town));
  const directors = towns
    .filter((town) => !played.has(town.row.name))
    .map((town) => ({
      subject: `director.${slug(town.row.name)}`,
      name: pairs.pop(),
      role: "director",
      town: town.row.name,
    }));
  return [...cast, ...directors].map((person, index) => ({
    id: index + 1,
    subject: person.subject,
    name: person.name,
    email: `${mailbox(person)}@${person.town === null ? "tarnvalley" : slug(person.town)}.example`,
    role: person.role,
    town_id: person.town === null ? null : idByTown.get(person.town),
    is_active: 1,
    created_at: "2021-05-10 14:00:00.000",
  }));
}

function mailbox({ subject }) {
  return subject.startsWith("director.") ? "director" : subject;
}

/** A name as it stands in an address: lower case, hyphens for blanks. */
function slug(name) {
  return name.toLowerCase().replaceAll(" ", "-");
}
