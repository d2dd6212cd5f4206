import { SubPages } from "#app/components/ui/sub-pages.tsx";

const pages = [
  { label: "Trucks", to: "/fleet", isOwnAddressOnly: true },
  { label: "Due", to: "/fleet/due" },
  { label: "Worksheets", to: "/fleet/worksheets" },
  { label: "Cab cards", to: "/fleet/cards" },
  { label: "Bands", to: "/fleet/bands" },
];

/** The pages of the fleet. */
export function FleetPages() {
  return (
    <div className="mt-4">
      <SubPages label="Fleet" pages={pages} />
    </div>
  );
}
