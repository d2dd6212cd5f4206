export function SkipLink() {
  return (
    <a
      href="#main"
      className="absolute top-2 left-2 z-30 -translate-y-24 rounded-field bg-asphalt px-4 py-3 font-semibold text-salt focus:translate-y-0 print:hidden"
    >
      Skip to the page
    </a>
  );
}
