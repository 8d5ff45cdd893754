import { ChevronDown } from 'lucide-react';
import { INSTRUMENTS, type Instrument } from '../../../../shared/constants/instrument-bands.ts';
import { VALUE_SCALES, type ValueScale } from '../../../../shared/constants/value-scales.ts';
import { Button } from '../../components/ui/button.tsx';
import { Menu, MenuItem, MenuLabel } from '../../components/ui/menu.tsx';

interface PresetMenusProps {
  onInstrument: (instrument: Instrument) => void;
  onScale: (scale: ValueScale) => void;
}

/** Ways to fill the band table; nothing is kept before it is saved. */
export function PresetMenus({ onInstrument, onScale }: PresetMenusProps) {
  return (
    <div className="flex flex-wrap gap-2">
      <Menu
        trigger={
          <Button size="sm">
            Wavelengths by instrument <ChevronDown aria-hidden />
          </Button>
        }
      >
        <MenuLabel>Fills centre wavelength and ground sample</MenuLabel>
        {INSTRUMENTS.map((instrument) => (
          <MenuItem key={instrument.id} onSelect={() => onInstrument(instrument)}>
            {instrument.name}
          </MenuItem>
        ))}
      </Menu>
      <Menu
        trigger={
          <Button size="sm">
            Scale and offset by product <ChevronDown aria-hidden />
          </Button>
        }
      >
        <MenuLabel>Fills scale, offset and what they give</MenuLabel>
        {VALUE_SCALES.map((scale) => (
          <MenuItem key={scale.id} onSelect={() => onScale(scale)}>
            <span className="block">{scale.name}</span>
            <span className="block text-xs text-ink-soft">{scale.note}</span>
          </MenuItem>
        ))}
      </Menu>
    </div>
  );
}
