import type { SettingSpec } from '@/components/suggestion/settings';
import { StepperField } from './StepperField';
import type { Typed } from './stepping';
import { useTyped } from './useTyped';

interface SettingSteppersProps {
  specs: readonly SettingSpec[];
  initial: Typed;
  /** Name of the group in the form: fields are `<group>.<key>`. */
  group: string;
  errors: Readonly<Record<string, string>>;
}

/** The settings of a form, one field each. Without script they are plain inputs; with it each gets step buttons. */
export function SettingSteppers({ specs, initial, group, errors }: SettingSteppersProps) {
  const { typed, setOne, ready, refFor } = useTyped(initial, specs);
  return (
    <div className="steppers">
      {specs.map((spec) => (
        <StepperField
          key={spec.key}
          spec={spec}
          name={`${group}.${spec.key}`}
          text={typed[spec.key] ?? ''}
          onText={(text) => setOne(spec.key, text)}
          ready={ready}
          error={errors[`${group}.${spec.key}`]}
          inputRef={refFor(spec.key)}
        />
      ))}
    </div>
  );
}
