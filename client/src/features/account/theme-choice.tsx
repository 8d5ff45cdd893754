import { RadioGroup } from '../../components/ui/radio-group.tsx';
import { useTheme } from '../../lib/theme.ts';

/** Light, dark, or as the system says; kept in this browser. */
export function ThemeChoiceField() {
  const { choice, choose } = useTheme();
  return (
    <RadioGroup
      aria-label="Theme"
      value={choice}
      onChange={choose}
      options={[
        { value: 'system', label: 'As the system' },
        { value: 'light', label: 'Light' },
        { value: 'dark', label: 'Dark' },
      ]}
    />
  );
}
