import { PROJECT_ROLES, type ProjectRole, ROLE_TEXT } from '../../../../shared/constants/roles.ts';
import { Checkbox } from '../../components/ui/checkbox.tsx';

interface RolePickerProps {
  value: readonly ProjectRole[];
  onChange: (roles: ProjectRole[]) => void;
  error?: string | undefined;
}

/** The five roles with what each does; a person may hold several. */
export function RolePicker({ value, onChange, error }: RolePickerProps) {
  const toggle = (role: ProjectRole, isOn: boolean) =>
    onChange(PROJECT_ROLES.filter((other) => (other === role ? isOn : value.includes(other))));
  return (
    <fieldset aria-describedby={error ? 'roles-error' : undefined}>
      <legend className="text-sm font-medium">Roles</legend>
      <div className="mt-2 space-y-2.5">
        {PROJECT_ROLES.map((role) => (
          <Checkbox
            key={role}
            label={ROLE_TEXT[role].name}
            hint={capitalise(ROLE_TEXT[role].does)}
            isChecked={value.includes(role)}
            onChange={(isOn) => toggle(role, isOn)}
          />
        ))}
      </div>
      {error && (
        <p id="roles-error" role="alert" className="mt-2 text-xs font-medium text-rust">
          {error}
        </p>
      )}
    </fieldset>
  );
}

function capitalise(text: string): string {
  return text.charAt(0).toUpperCase() + text.slice(1);
}
