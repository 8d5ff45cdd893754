import type { BandRole } from './bands.ts';

/** A band of an instrument: what it is called in the product's files, and what it measures. */
export interface InstrumentBand {
  /** As file names and band descriptions carry it, without leading zeros: "4", "8A", "6". */
  code: string;
  role: BandRole;
  /** Middle of the band's edges. */
  centreWavelengthUm: number;
  /** The instrument's own footprint, also where files are delivered on a finer grid (thermal bands). */
  gsdMeters: number;
}

export interface Instrument {
  id: string;
  name: string;
  bands: readonly InstrumentBand[];
}

const band = (code: string, role: BandRole, centreWavelengthUm: number, gsdMeters: number): InstrumentBand => ({
  code,
  role,
  centreWavelengthUm,
  gsdMeters,
});

/**
 * Centre wavelengths and ground sample distances of the instruments whose scenes are most often mapped.
 *
 * OLI and TIRS: middles of the band edges in the USGS/NASA band handout.
 * ETM+: middles of the edges in the USGS data users handbook (from memory).
 * TM: middles of the edges as the USGS band designations give them (0.45–0.52, 0.52–0.60, 0.63–0.69, 0.76–0.90,
 * 1.55–1.75, 10.40–12.50, 2.08–2.35 µm).
 * MSI: nominal centres of the ESA product description; the two units differ from them by a few nanometres.
 */
export const INSTRUMENTS: readonly Instrument[] = [
  {
    id: 'oli-tirs',
    name: 'OLI and TIRS',
    bands: [
      band('1', 'coastal', 0.443, 30),
      band('2', 'blue', 0.482, 30),
      band('3', 'green', 0.5615, 30),
      band('4', 'red', 0.6545, 30),
      band('5', 'nir', 0.865, 30),
      band('6', 'swir1', 1.6085, 30),
      band('7', 'swir2', 2.2005, 30),
      band('8', 'pan', 0.5895, 15),
      band('9', 'cirrus', 1.3735, 30),
      band('10', 'thermal', 10.895, 100),
      band('11', 'thermal', 12.005, 100),
    ],
  },
  {
    id: 'etm-plus',
    name: 'ETM+',
    bands: [
      band('1', 'blue', 0.485, 30),
      band('2', 'green', 0.56, 30),
      band('3', 'red', 0.66, 30),
      band('4', 'nir', 0.835, 30),
      band('5', 'swir1', 1.65, 30),
      band('6', 'thermal', 11.45, 60),
      band('7', 'swir2', 2.22, 30),
      band('8', 'pan', 0.71, 15),
    ],
  },
  {
    id: 'tm',
    name: 'TM',
    bands: [
      band('1', 'blue', 0.485, 30),
      band('2', 'green', 0.56, 30),
      band('3', 'red', 0.66, 30),
      band('4', 'nir', 0.83, 30),
      band('5', 'swir1', 1.65, 30),
      band('6', 'thermal', 11.45, 120),
      band('7', 'swir2', 2.215, 30),
    ],
  },
  {
    id: 'msi',
    name: 'MSI',
    bands: [
      band('1', 'coastal', 0.443, 60),
      band('2', 'blue', 0.49, 10),
      band('3', 'green', 0.56, 10),
      band('4', 'red', 0.665, 10),
      band('5', 'red-edge', 0.705, 20),
      band('6', 'red-edge', 0.74, 20),
      band('7', 'red-edge', 0.783, 20),
      band('8', 'nir', 0.842, 10),
      band('8A', 'nir', 0.865, 20),
      band('9', 'other', 0.945, 60),
      band('10', 'cirrus', 1.375, 60),
      band('11', 'swir1', 1.61, 20),
      band('12', 'swir2', 2.19, 20),
    ],
  },
];
