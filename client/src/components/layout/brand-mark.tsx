/** Groundsel's flower on its stem: five petals, one leaf. Decorative; the name stands beside it. */
export function BrandMark({ className }: { className?: string }) {
  return (
    <svg aria-hidden viewBox="0 0 24 24" className={className} strokeLinecap="round">
      <path d="M12.200 22.600c.8-4.600-.6-7.600-.2-11.600" fill="none" stroke="var(--spruce)" strokeWidth="1.900" />
      <path d="M12.400 19.200c-4 .3-6.600-1.500-7.700-4.800 4.300-.7 6.700 1.200 7.700 4.800Z" fill="var(--spruce)" />
      <g fill="var(--groundsel)" stroke="var(--groundsel-deep)" strokeWidth=".7">
        {[0, 72, 144, 216, 288].map((turn) => (
          <path
            key={turn}
            d="M12 7.600c-1.700-1.500-2.100-3.900 0-6.200 2.100 2.300 1.700 4.700 0 6.200Z"
            transform={`rotate(${turn} 12 8)`}
          />
        ))}
      </g>
      <circle cx="12" cy="8" r="1.900" fill="#a87400" />
    </svg>
  );
}
