import { Field } from '#src/ui/field.tsx';

/** The slider's own whole steps, and how they read as the field's text. */
export type Scale = {
  least: number;
  most: number;
  step: number;
  /** Null where the text does not read. */
  at: (text: string) => number | null;
  text: (at: number) => string;
};

/** A number to type and a slider that says the same; the text may go beyond the slider's ends. */
export function SliderField({
  label,
  unit,
  value,
  error,
  scale,
  onText,
  onLeave,
}: {
  label: string;
  unit: string;
  value: string;
  error: string | undefined;
  scale: Scale;
  onText: (text: string) => void;
  onLeave: () => void;
}) {
  const at = scale.at(value) ?? scale.least;
  return (
    <div className="flex flex-wrap items-end gap-x-5">
      <Field
        label={label}
        unit={unit}
        inputMode="decimal"
        className="input-number max-w-[110px]"
        error={error}
        value={value}
        onChange={(event) => onText(event.target.value)}
        onBlur={onLeave}
      />
      <input
        type="range"
        aria-label={`${label}, slider`}
        aria-valuetext={unit === '$' ? `$${value}` : `${value} ${unit}`}
        className="h-11 min-w-[120px] flex-1 accent-accent"
        min={scale.least}
        max={scale.most}
        step={scale.step}
        value={Math.min(Math.max(at, scale.least), scale.most)}
        onChange={(event) => onText(scale.text(Number(event.target.value)))}
      />
    </div>
  );
}
