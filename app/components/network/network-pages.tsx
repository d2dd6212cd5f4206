import { SubPages } from "#app/components/ui/sub-pages.tsx";

const pages = [
  { label: "Overview", to: "/network", isOwnAddressOnly: true },
  { label: "Review", to: "/network/review" },
  { label: "Editions", to: "/network/editions" },
  { label: "Bands", to: "/network/bands" },
  { label: "People", to: "/network/people" },
  { label: "Mail", to: "/network/mail" },
  { label: "Trail", to: "/network/audit" },
];

/** The coordinator's pages. */
export function NetworkPages() {
  return <SubPages label="Network" pages={pages} />;
}
