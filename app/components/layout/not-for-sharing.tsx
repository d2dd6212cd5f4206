/** Stands above the bar on every page that shows towns by name. */
export function NotForSharing() {
  return (
    <p className="bg-asphalt text-note font-semibold text-salt print:border-b print:border-line print:bg-salt print:text-asphalt">
      <span className="mx-auto block max-w-column px-4 py-1 sm:px-8">
        Names and figures of towns. Not for sharing, not for the projector.
      </span>
    </p>
  );
}
