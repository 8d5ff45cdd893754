import { buildFieldPatchwork } from './field-patchwork.ts';
import { FlowerHead } from './flower-head.tsx';
import { leafOutline } from './leaf-outline.ts';

const PATCHES = buildFieldPatchwork();

/** Branches from the top: where each leaves the stem, where its head stands, how far it is open. */
const BRANCHES = [
  {
    stage: 'Overview',
    d: 'M402 330C402 280 400 240 402 196',
    x: 402,
    y: 168,
    openness: 1,
    lean: 6,
    size: 1.35,
    label: [482, 156],
  },
  {
    stage: 'Scenes',
    d: 'M402 372C380 330 330 320 296 274',
    x: 288,
    y: 256,
    openness: 1,
    lean: -20,
    size: 1.05,
    label: [196, 236],
  },
  {
    stage: 'Classes',
    d: 'M403 402C430 352 486 344 522 306',
    x: 530,
    y: 290,
    openness: 1,
    lean: 24,
    size: 1,
    label: [594, 276],
  },
  {
    stage: 'Samples',
    d: 'M402 462C366 432 300 426 262 392',
    x: 258,
    y: 394,
    openness: 0.8,
    lean: -22,
    size: 1.05,
    label: [196, 366],
  },
  {
    stage: 'Runs',
    d: 'M401 500C436 462 508 456 548 424',
    x: 552,
    y: 426,
    openness: 0.5,
    lean: 20,
    size: 1,
    label: [596, 404],
  },
  {
    stage: 'Accuracy',
    d: 'M399 566C368 542 318 542 290 512',
    x: 288,
    y: 514,
    openness: 0.22,
    lean: -16,
    size: 0.95,
    label: [228, 496],
  },
  {
    stage: 'Handover',
    d: 'M398 604C430 576 476 572 502 546',
    x: 504,
    y: 548,
    openness: 0,
    lean: 14,
    size: 0.9,
    label: [550, 530],
  },
] as const;

const LEAVES = [
  { x: 402, y: 384, turn: -160, length: 70, lobes: 4 },
  { x: 402, y: 424, turn: -20, length: 84, lobes: 4 },
  { x: 402, y: 494, turn: 202, length: 92, lobes: 4 },
  { x: 400, y: 538, turn: -14, length: 88, lobes: 4 },
  { x: 398, y: 634, turn: 186, length: 142, lobes: 6 },
  { x: 397, y: 656, turn: -14, length: 150, lobes: 6 },
];

/** The plate of the sign-in page: groundsel growing out of a chosen field, its heads the stages of the work. */
export function GroundselPlate({ className }: { className?: string }) {
  return (
    <svg
      role="img"
      aria-label="Drawing: a groundsel plant growing out of an outlined field. Its seven heads, open at the top and still in bud below, are the stages from overview to handover."
      viewBox="0 70 800 930"
      preserveAspectRatio="xMidYMax meet"
      className={className}
      style={{ overflow: 'visible' }}
      strokeLinecap="round"
    >
      <Graticule />
      <g strokeLinejoin="round">
        {PATCHES.map((patch) => (
          <path
            key={patch.d}
            d={patch.d}
            fill={patch.colour}
            stroke="var(--card)"
            strokeWidth="2.500"
            className="opacity-90"
          />
        ))}
      </g>
      <River />
      <ChosenField />
      <path d="M402 330C404 470 392 600 398 772" fill="none" stroke="#1f5f54" strokeWidth="7" />
      <path d="M400.500 340C402.500 470 390.500 600 396.500 770" fill="none" stroke="#3f7a5f" strokeWidth="2" />
      {LEAVES.map((leaf) => (
        <g key={leaf.y} transform={`translate(${leaf.x} ${leaf.y}) rotate(${leaf.turn})`}>
          <path
            d={leafOutline(leaf.length, leaf.lobes)}
            fill="#3f7a5f"
            stroke="#1f5f54"
            strokeWidth="1.600"
            strokeLinejoin="round"
          />
          <path
            d={`M0 0Q${leaf.length / 2} 3 ${leaf.length * 0.92} 0`}
            fill="none"
            stroke="#1f5f54"
            strokeWidth="1.400"
          />
        </g>
      ))}
      {BRANCHES.map((branch) => (
        <g key={branch.stage}>
          <path d={branch.d} fill="none" stroke="#1f5f54" strokeWidth="4.200" />
          <FlowerHead x={branch.x} y={branch.y} openness={branch.openness} lean={branch.lean} size={branch.size} />
          <text
            x={branch.label[0]}
            y={branch.label[1]}
            textAnchor={branch.label[0] < branch.x ? 'end' : 'start'}
            fill="var(--ink-soft)"
            fontSize="15"
            fontWeight="500"
          >
            {branch.stage}
          </text>
        </g>
      ))}
    </svg>
  );
}

/** The field the plant stands in, outlined as a sample is while it is drawn. */
function ChosenField() {
  const corners = [
    [268, 764],
    [398, 738],
    [540, 762],
    [566, 822],
    [420, 850],
    [252, 826],
  ] as const;
  const ring = corners.map(([x, y]) => `${x} ${y}`).join('L');
  return (
    <g strokeLinejoin="round">
      <path d={`M${ring}Z`} fill="#c9dc67" stroke="#1e2a26" strokeWidth="6" />
      <path d={`M${ring}Z`} fill="none" stroke="var(--groundsel)" strokeWidth="3" />
      {corners.map(([x, y]) => (
        <circle key={x} cx={x} cy={y} r="7" fill="#fffdf8" stroke="#1e2a26" strokeWidth="2.500" />
      ))}
      <path
        d="M398 772q-9-10-15-11M398 773q-15-4-24-2M398 772q10-11 17-11M398 773q15-5 25-2"
        stroke="#1f5f54"
        strokeWidth="3"
        fill="none"
      />
    </g>
  );
}

/** A river out of the hills, wider as it comes nearer. */
function River() {
  const colour = '#294483';
  return (
    <path
      d="M681 652C668 658 700 660 692 676 676 708 604 716 612 752 620 790 700 800 690 858 680 930 596 940 590 1012L690 1012C700 950 766 936 764 856 762 790 660 786 652 752 646 722 706 712 711 676 714 660 680 658 687 652Z"
      fill={colour}
      stroke="var(--card)"
      strokeWidth="2.500"
      strokeLinejoin="round"
    />
  );
}

/** Faint meridians and parallels with their ticks, as on a map sheet. */
function Graticule() {
  return (
    <g fill="none" stroke="var(--line)" strokeWidth="1">
      {[-560, -400, -240, -80, 80, 240, 400, 560, 720, 880, 1040, 1200, 1360].map((x) => (
        <path key={`x${x}`} d={`M${x} -400V720`} />
      ))}
      {[-220, -60, 100, 260, 420, 580].map((y) => (
        <path key={`y${y}`} d={`M-700 ${y}H1500`} />
      ))}
    </g>
  );
}
