import { describe, expect, it } from 'vitest';
import {
  brightnessTemperatureK,
  msiLevel2Scaling,
  oliCollection2Reflectance,
  rescaleDn,
  tirsCollection2Temperature,
} from '../../server/analysis/spectral/rescale-dn.ts';
import { computeSeparability } from '../../server/analysis/spectral/separability.ts';
import {
  computeSpectralIndex,
  spectralIndices,
  type SpectralIndexId,
} from '../../server/analysis/spectral/spectral-index.ts';
import { checkValues } from '../fixtures/check-values.ts';

const { scaling, indices, separability } = checkValues;

describe('digital numbers of products', () => {
  it.each(scaling.c2l2sr.cases)('OLI Collection 2 reflectance of DN %d is %d (USGS; its example prints 18639 → 0.313)', (dn, value) => {
    expect(rescaleDn(Uint16Array.of(dn), oliCollection2Reflectance)[0]).toBeCloseTo(value, 7);
  }); // prettier-ignore

  it.each(scaling.c2l2st.cases)('TIRS Collection 2 temperature of DN %d is %d K (USGS; prints 302.6)', (dn, value) => {
    expect(rescaleDn(Uint16Array.of(dn), tirsCollection2Temperature)[0]).toBeCloseTo(value, 4);
  });

  it.each(scaling.s2l2a.cases)('MSI Level-2A reflectance of DN %d with the offset of baseline 04.00 is %d (ESA)', (dn, value) => {
    const { offset, quant } = scaling.s2l2a;
    expect(rescaleDn(Uint16Array.of(dn), msiLevel2Scaling(offset, quant))[0]).toBeCloseTo(value, 7);
  }); // prettier-ignore

  it.each(scaling.tirsB10.cases)(
    'TIRS band 10 brightness temperature of DN %d is %d K (USGS handbook)',
    (dn, kelvin) => {
      const { K1, K2, mult, add } = scaling.tirsB10;
      expect(brightnessTemperatureK(dn * mult + add, K1, K2)).toBeCloseTo(kelvin, 9);
    },
  );

  it('are no data where they are fill, never the offset', () => {
    expect(rescaleDn(Uint16Array.of(0, 1), oliCollection2Reflectance)[0]).toBeNaN();
    expect(rescaleDn(Uint16Array.of(0, 1), oliCollection2Reflectance)[1]).toBeCloseTo(-0.1999725, 7);
    expect(brightnessTemperatureK(0, 774.8853, 1321.0789)).toBeNaN();
  });
});

describe('spectral indices', () => {
  const bands = Object.fromEntries(
    Object.entries(indices.input).map(([role, value]) => [role, Float32Array.of(value)]),
  ) as Record<keyof typeof indices.input, Float32Array>;
  // EVI2 (Jiang et al. 2008) and NDMI (Gao 1996) by hand: 0.85/1.544 and 0.18/0.62.
  const wanted: Record<SpectralIndexId, number> = {
    ndvi: indices['NDVI'],
    ndwi: indices['NDWI'],
    mndwi: indices['MNDWI'],
    ndbi: indices['NDBI'],
    nbr: indices['NBR'],
    savi: indices['SAVI'],
    evi: indices['EVI'],
    evi2: 0.5505181347,
    ndmi: 0.2903225806,
  };

  it.each(Object.keys(spectralIndices) as SpectralIndexId[])(
    '%s has its value for the reference reflectances',
    (id) => {
      expect(computeSpectralIndex(id, bands)[0]).toBeCloseTo(wanted[id], 6);
    },
  );

  it('differ from the ratio of raw numbers where the product has an offset', () => {
    const dn = { nir: Uint16Array.of(21818), red: Uint16Array.of(9455) };
    const reflectance = { nir: rescaleDn(dn.nir, oliCollection2Reflectance), red: rescaleDn(dn.red, oliCollection2Reflectance) }; // prettier-ignore
    expect(computeSpectralIndex('ndvi', reflectance)[0]).toBeCloseTo(0.73908, 5);
    const msi = msiLevel2Scaling(-1000, 10000);
    const ndvi = computeSpectralIndex('ndvi', { nir: rescaleDn(Uint16Array.of(5000), msi), red: rescaleDn(Uint16Array.of(1600), msi) }); // prettier-ignore
    expect(ndvi[0]).toBeCloseTo(0.7391, 4);
  });
});

describe('separability of normal classes (integrated numerically from the definitions as well)', () => {
  it.each(separability)('N($m1, $S1) and N($m2, $S2)', ({ m1, S1, m2, S2, B, JM, JMsquared, D, TD }) => {
    const one = { nPixels: 100, mean: Float64Array.from(m1), covariance: Float64Array.from(S1.flat()) };
    const two = { nPixels: 100, mean: Float64Array.from(m2), covariance: Float64Array.from(S2.flat()) };
    for (const result of [computeSeparability(one, two)!, computeSeparability(two, one)!]) {
      expect(result.bhattacharyya).toBeCloseTo(B, 11);
      expect(result.jeffriesMatusita).toBeCloseTo(JM, 11);
      expect(result.jeffriesMatusitaSquared).toBeCloseTo(JMsquared, 11);
      expect(result.divergence).toBeCloseTo(D, 11);
      expect(result.transformedDivergence).toBeCloseTo(TD, 11);
    }
  });
});
