/** The demo's class scheme, in the order of the generator's codes 1 to 10. */
export const DEMO_CLASSES: readonly { name: string; definition: string }[] = [
  { name: 'Open water', definition: 'Sea below low water, lochs, and rivers at least one pixel wide.' },
  { name: 'Tidal flat', definition: 'Mud and sand laid bare at low water, without rooted plants.' },
  { name: 'Saltmarsh', definition: 'Salt-tolerant plants between mean high water and the highest tides.' },
  {
    name: 'Broadleaf woodland',
    definition: 'Trees over 5 m that shed their leaves, crowns covering at least half; hedges one pixel wide or more.',
  },
  {
    name: 'Conifer plantation',
    definition: 'Planted evergreen conifers in blocks with straight edges, felled ground not counted.',
  },
  { name: 'Heath and moor', definition: 'Heather, purple moor-grass and blanket bog on the high ground.' },
  { name: 'Improved pasture', definition: 'Sown or fertilised grass, grazed or mown; green on both dates.' },
  { name: 'Arable', definition: 'Ploughed at least once a year: bare, growing or stubble, depending on the date.' },
  { name: 'Bare rock', definition: 'Crags, scree and shingle with less than a tenth covered by plants.' },
  { name: 'Built-up', definition: 'Buildings, yards and sealed roads, with the gardens between them.' },
];
