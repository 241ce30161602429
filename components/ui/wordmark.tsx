/** The tag with its wire, and the name. */
export function Wordmark() {
  return (
    <span className="flex items-center gap-2 font-stencil text-[25px] leading-none font-extrabold tracking-[0.06em] text-[#f6e6bc] uppercase">
      <svg width="22" height="26" viewBox="0 0 22 26" aria-hidden>
        <path d="M6 1h10l5 5v19H1V6z" fill="#EED9A6" />
        <circle cx="11" cy="8" r="3.2" fill="#16202C" />
        <path d="M11 8C9 3 4-2 2 3" stroke="#C98F2B" fill="none" strokeWidth="1.6" />
      </svg>
      Wiretag
    </span>
  );
}
