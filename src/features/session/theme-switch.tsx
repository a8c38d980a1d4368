import { chooseTheme, useTheme } from '#src/lib/theme.ts';
import { Choice } from '#src/ui/choice.tsx';

export function ThemeSwitch() {
  return (
    <Choice
      label="Theme"
      options={[
        { value: 'daylight', label: 'Daylight' },
        { value: 'darkroom', label: 'Darkroom' },
      ]}
      value={useTheme()}
      onChoose={chooseTheme}
    />
  );
}
