/** The mark and the word: a level beam with two pails on a road to the horizon. Stays legible from 20 px up. */
export function Mark() {
  return (
    <>
      <svg viewBox="0 0 32 32" aria-hidden="true" className="block size-7.5 flex-none">
        <path className="fill-spruce" d="M2 3h28v3.6h-2V10h4l-1.7 7h-6.6L22 10h4V6.6H6V10h4l-1.7 7H1.7L0 10h4V6.6H2z" />
        <path
          className="fill-asphalt"
          fillRule="evenodd"
          d="M14.1 6.6h3.8L25.4 30H6.6zM15.4 10.4h1.2v3.4h-1.2zM15 16.4h2v4.2h-2zM14.5 23.4h3V30h-3z"
        />
      </svg>
      <span className="sm:max-md:sr-only">Commonweigh</span>
    </>
  );
}
