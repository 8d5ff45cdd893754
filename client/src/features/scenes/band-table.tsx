import type { ReactNode } from 'react';
import { type Control, Controller, type FieldErrors, type UseFormRegister, useWatch } from 'react-hook-form';
import { BAND_QUANTITIES, BAND_ROLES, BAND_ROLE_NAME } from '../../../../shared/constants/bands.ts';
import type { Band } from '../../../../shared/contracts/scene.ts';
import { NumberInput } from '../../components/ui/number-input.tsx';
import { Select } from '../../components/ui/select.tsx';
import { TextInput } from '../../components/ui/text-input.tsx';
import { classNames } from '../../lib/class-names.ts';
import { formatNumber } from '../../lib/format.ts';
import { formatShort } from './scene-text.ts';
import type { SceneFormInput, SceneValues } from './scene-values.ts';

interface BandTableProps {
  bands: readonly Band[];
  control: Control<SceneFormInput, unknown, SceneValues>;
  register: UseFormRegister<SceneFormInput>;
  errors: FieldErrors<SceneFormInput>;
}

const ROLE_OPTIONS = BAND_ROLES.map((role) => ({ value: role, label: BAND_ROLE_NAME[role] }));
const QUANTITY_NAME = { reflectance: 'Reflectance', kelvin: 'Kelvin', 'digital number': 'Digital number' };
const QUANTITY_OPTIONS = BAND_QUANTITIES.map((value) => ({ value, label: QUANTITY_NAME[value] }));
const CELL_INPUT = 'min-h-8! rounded-md! px-2! py-0.5! text-sm!';

/** The band table as fields: one row a band, with what its middle 96 % of values become at the right. */
export function BandTable({ bands, control, register, errors }: BandTableProps) {
  return (
    <div className="overflow-x-auto rounded-xl border border-line bg-card">
      <table aria-label="Band table" className="w-full min-w-[50rem] text-sm">
        <thead>
          <tr className="text-left text-xs text-ink-soft">
            <Head className="w-9 pl-4 text-right">No.</Head>
            <Head>Name</Head>
            <Head className="w-44 max-lg:w-38">Role</Head>
            <Head className="w-24 max-lg:w-20">Centre, µm</Head>
            <Head className="w-24 max-lg:w-20">Ground sample, m</Head>
            <Head className="w-28 max-lg:w-26">Scale</Head>
            <Head className="w-24 max-lg:w-20">Offset</Head>
            <Head className="w-36 max-lg:w-34 max-lg:pr-4">Gives</Head>
            <Head className="w-36 pr-4 text-right max-lg:hidden">2–98 % become</Head>
          </tr>
        </thead>
        <tbody className="align-top">
          {bands.map((band, index) => (
            <BandFields
              key={band.id}
              band={band}
              index={index}
              control={control}
              register={register}
              errors={errors.bands?.[index]}
            />
          ))}
        </tbody>
      </table>
    </div>
  );
}

function Head({ className, children }: { className?: string; children: ReactNode }) {
  return (
    <th
      scope="col"
      className={classNames('border-b border-line px-1.5 pt-3 pb-1.5 align-bottom font-medium', className)}
    >
      {children}
    </th>
  );
}

type RowErrors = NonNullable<FieldErrors<SceneFormInput>['bands']>[number];

interface BandFieldsProps extends Omit<BandTableProps, 'bands' | 'errors'> {
  band: Band;
  index: number;
  errors: RowErrors;
}

function BandFields({ band, index, control, register, errors }: BandFieldsProps) {
  const label = (what: string) => `Band ${band.number}, ${what}`;
  const figure = (name: 'centreWavelengthUm' | 'gsdMeters' | 'scale' | 'offset', what: string) => (
    <Cell error={errors?.[name]?.message}>
      <Controller
        control={control}
        name={`bands.${index}.${name}`}
        render={({ field, fieldState }) => (
          <NumberInput
            ref={field.ref}
            aria-label={label(what)}
            aria-invalid={fieldState.invalid || undefined}
            value={field.value}
            onChange={field.onChange}
            onBlur={field.onBlur}
            className={classNames(CELL_INPUT, 'text-right')}
          />
        )}
      />
    </Cell>
  );
  return (
    <tr className="border-b border-line last:border-b-0">
      <th scope="row" className="py-3 pl-4 text-right font-normal text-ink-soft">
        {band.number}
      </th>
      <Cell error={errors?.name?.message}>
        <TextInput
          aria-label={label('name')}
          aria-invalid={errors?.name ? true : undefined}
          autoComplete="off"
          className={CELL_INPUT}
          {...register(`bands.${index}.name`)}
        />
        <div className="mt-1 lg:hidden">
          <Become band={band} index={index} control={control} />
        </div>
      </Cell>
      <Cell error={errors?.role?.message}>
        <Controller
          control={control}
          name={`bands.${index}.role`}
          render={({ field }) => (
            <Select
              size="sm"
              aria-label={label('role')}
              value={field.value}
              onChange={field.onChange}
              options={ROLE_OPTIONS}
              className="min-h-8!"
            />
          )}
        />
      </Cell>
      {figure('centreWavelengthUm', 'centre wavelength in µm')}
      {figure('gsdMeters', 'ground sample distance in m')}
      {figure('scale', 'scale')}
      {figure('offset', 'offset')}
      <Cell error={errors?.quantity?.message}>
        <Controller
          control={control}
          name={`bands.${index}.quantity`}
          render={({ field }) => (
            <Select
              size="sm"
              aria-label={label('what its values are')}
              value={field.value}
              onChange={field.onChange}
              options={QUANTITY_OPTIONS}
              className="min-h-8!"
            />
          )}
        />
      </Cell>
      <td className="py-2 pr-4 pl-1.5 text-right max-lg:hidden">
        <Become band={band} index={index} control={control} />
      </td>
    </tr>
  );
}

function Cell({ error, children }: { error: string | undefined; children: ReactNode }) {
  return (
    <td className="px-1.5 py-1.5">
      {children}
      {error && (
        <p role="alert" className="mt-0.5 text-xs font-medium text-rust">
          {error}
        </p>
      )}
    </td>
  );
}

const DECIMALS = { reflectance: 3, kelvin: 1, 'digital number': 0 };

/** What the middle of the stored values becomes by scale and offset, as typed; out of range is said. */
function Become({ band, index, control }: Pick<BandFieldsProps, 'band' | 'index' | 'control'>) {
  const { scale, offset, quantity } = useWatch({ control, name: `bands.${index}` });
  const { p2, p98 } = band.statistics;
  const stored = `DN ${formatShort(p2)}–${formatShort(p98)}`;
  if (typeof scale !== 'number' || typeof offset !== 'number') return <p className="text-xs text-ink-soft">{stored}</p>;
  const [low, high] = [p2 * scale + offset, p98 * scale + offset].sort((a, b) => a - b) as [number, number];
  const decimals = quantity === 'digital number' && high - low < 10 ? 3 : DECIMALS[quantity];
  const doubt = doubtOf(low, high, quantity);
  const isAsStored = scale === 1 && offset === 0;
  return (
    <>
      <p className={classNames('whitespace-nowrap', doubt && 'font-medium text-rust')}>
        {formatNumber(low, decimals)} – {formatNumber(high, decimals)}
        {quantity === 'kelvin' && ' K'}
      </p>
      <p className="text-xs whitespace-nowrap text-ink-soft">{doubt ?? (isAsStored ? 'as stored' : stored)}</p>
    </>
  );
}

/** Land and water lie within −0.2 to 1.6 and 180 to 360 K in every surface product; beyond, the scale is in doubt. */
function doubtOf(low: number, high: number, quantity: SceneValues['bands'][number]['quantity']): string | null {
  if (quantity === 'reflectance' && (low < -0.25 || high > 1.6)) return 'hardly a reflectance';
  if (quantity === 'kelvin' && (low < 180 || high > 360)) return 'hardly a ground temperature';
  return null;
}
