/** A bud on its stem, not open yet: stands where nothing is so far. Decorative. */
export function Sprig({ className }: { className?: string }) {
  return (
    <svg aria-hidden viewBox="0 0 40 64" className={className} fill="none" strokeLinecap="round" strokeLinejoin="round">
      <path d="M19 62c2-14-1-22 1-39" stroke="var(--spruce)" strokeWidth="2" />
      <path
        d="M20 47c-7 1-12-2-15-9 7-2 13 1 15 9Z"
        stroke="var(--spruce)"
        strokeWidth="1.6"
        fill="var(--spruce-wash)"
      />
      <path
        d="M20 40c6 0 11-3 13-10-7-1-12 3-13 10Z"
        stroke="var(--spruce)"
        strokeWidth="1.6"
        fill="var(--spruce-wash)"
      />
      <path
        d="M20 23c-5 0-7-4-6-9l6-10 6 10c1 5-1 9-6 9Z"
        stroke="var(--groundsel-deep)"
        strokeWidth="1.8"
        fill="var(--card)"
      />
      <path
        d="M15.5 22c-1-4 .5-8 4.500-12M24.500 22c1-4-.5-8-4.500-12"
        stroke="var(--groundsel-deep)"
        strokeWidth="1.2"
      />
    </svg>
  );
}
