export interface FlowerHeadProps {
  x: number;
  y: number;
  /** 0 is a closed bud, 1 fully open. */
  openness: number;
  /** Degrees the head leans from upright. */
  lean?: number;
  size?: number;
}

/** One head of groundsel: a green cup, and as it opens a ring of yellow rays round a disc. */
export function FlowerHead({ x, y, openness, lean = 0, size = 1 }: FlowerHeadProps) {
  return (
    <g transform={`translate(${x} ${y}) rotate(${lean}) scale(${size})`} strokeLinejoin="round">
      {openness > 0.85 ? <OpenHead /> : <CupHead openness={openness} />}
    </g>
  );
}

function OpenHead() {
  return (
    <>
      {[...Array(13).keys()].map((index) => (
        <path
          key={index}
          d="M-5-12C-8-26-6.500-38 0-44 6.500-38 8-26 5-12Z"
          transform={`rotate(${index * (360 / 13) + (index % 2) * 4}) scale(1 ${index % 3 === 0 ? 0.93 : 1})`}
          fill="var(--groundsel)"
          stroke="#c08f00"
          strokeWidth="1.2"
        />
      ))}
      <circle r="14.500" fill="#b97f00" stroke="#8a5f00" strokeWidth="1.2" />
      {[...Array(34).keys()].map((index) => {
        // Vogel's sunflower spiral: the golden angle, radius by square root.
        const angle = index * 2.39996;
        const radius = 2.25 * Math.sqrt(index);
        return (
          <circle key={index} cx={radius * Math.cos(angle)} cy={radius * Math.sin(angle)} r="1.050" fill="#f9d968" />
        );
      })}
    </>
  );
}

function CupHead({ openness }: { openness: number }) {
  const rise = 4 + 30 * openness;
  const spread = 4 + 14 * openness;
  return (
    <>
      {openness > 0.1 &&
        [-1, -0.55, 0, 0.55, 1].map((side) => (
          <path
            key={side}
            d={`M${side * 7 - 3}-24Q${side * spread - 5}-${24 + rise * 0.6} ${side * spread * 1.25}-${26 + rise - Math.abs(side) * 5}Q${side * spread + 5}-${24 + rise * 0.6} ${side * 7 + 3}-24Z`}
            fill="var(--groundsel)"
            stroke="#c08f00"
            strokeWidth="1.1"
          />
        ))}
      <path
        d="M-9-25C-13-14-11-3 0 2 11-3 13-14 9-25 5-29-5-29-9-25Z"
        fill="#3f7a5f"
        stroke="#1f5f54"
        strokeWidth="1.3"
      />
      <path d="M-4-26C-6-16-4-6 0 0M4-26C6-16 4-6 0 0" fill="none" stroke="#1f5f54" strokeWidth="1" opacity=".6" />
    </>
  );
}
