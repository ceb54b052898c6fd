import { useId, type ComponentProps, type ReactNode } from "react";

import { cx } from "@/components/cx";

/** What react-hook-form or a server action gives: a sentence, an object with one, or several. */
export type FieldError = string | string[] | { message?: string } | null | undefined;

/** The sentence to show, or undefined. */
export function errorText(error: FieldError): string | undefined {
  if (!error) return undefined;
  if (typeof error === "string") return error;
  if (Array.isArray(error)) return error[0];
  return error.message;
}

type Shared = { label: ReactNode; hint?: ReactNode; error?: FieldError; optional?: boolean };

const BOX =
  "w-full rounded-sm border border-edge bg-sheet px-3 font-ui text-base text-ink placeholder:text-quiet " +
  "hover:border-ink aria-[invalid=true]:border-red aria-[invalid=true]:bg-red-wash disabled:bg-sunk disabled:text-quiet";

/** Text that can be read only. Not for lists: to CSS a <select> is always read-only. */
const TEXT_BOX = `${BOX} read-only:bg-sunk`;

/** Ties the label, the hint and the error of one control together by id; the control is given by `children(props)`. */
export function FieldShell({
  label,
  hint,
  error,
  optional,
  id,
  className,
  children,
}: Shared & {
  id: string;
  className?: string;
  children: (tie: { id: string; "aria-describedby"?: string; "aria-invalid"?: true }) => ReactNode;
}) {
  const message = errorText(error);
  const described = [hint ? `${id}-hint` : "", message ? `${id}-error` : ""].filter(Boolean).join(" ");
  return (
    <div className={cx("font-ui", className)}>
      <label htmlFor={id} className="block text-sm font-medium text-ink">
        {label}
        {optional ? <span className="font-normal text-quiet"> (optional)</span> : null}
      </label>
      {hint ? (
        <p id={`${id}-hint`} className="mt-0.5 text-xs text-quiet">
          {hint}
        </p>
      ) : null}
      <div className="mt-1.5">
        {children({
          id,
          "aria-describedby": described || undefined,
          "aria-invalid": message ? true : undefined,
        })}
      </div>
      {message ? <FieldMessage id={`${id}-error`}>{message}</FieldMessage> : null}
    </div>
  );
}

/** An error written under the control it concerns. */
export function FieldMessage({ id, children }: { id?: string; children: ReactNode }) {
  return (
    <p id={id} className="mt-1.5 flex gap-1.5 font-ui text-sm text-red">
      <svg viewBox="0 0 12 16" width="10" height="14" aria-hidden="true" className="mt-1 shrink-0">
        <path
          d="M1.5 14 6 3l4.5 11"
          fill="none"
          stroke="currentColor"
          strokeWidth="1.6"
          strokeLinecap="round"
        />
      </svg>
      <span>
        <span className="sr-only">Error: </span>
        {children}
      </span>
    </p>
  );
}

/** One line of text with its label, hint and error. Spread `register("name")` into it. */
export function Field({
  label,
  hint,
  error,
  optional,
  id,
  className,
  inputClassName,
  ...input
}: Shared & ComponentProps<"input"> & { inputClassName?: string }) {
  const own = useId();
  return (
    <FieldShell {...{ label, hint, error, optional, className }} id={id ?? own}>
      {(tie) => <input type="text" className={cx(TEXT_BOX, "h-11", inputClassName)} {...input} {...tie} />}
    </FieldShell>
  );
}

/** Several lines of text. */
export function TextArea({
  label,
  hint,
  error,
  optional,
  id,
  className,
  inputClassName,
  ...input
}: Shared & ComponentProps<"textarea"> & { inputClassName?: string }) {
  const own = useId();
  return (
    <FieldShell {...{ label, hint, error, optional, className }} id={id ?? own}>
      {(tie) => (
        <textarea
          rows={4}
          className={cx(TEXT_BOX, "py-2 leading-relaxed", inputClassName)}
          {...input}
          {...tie}
        />
      )}
    </FieldShell>
  );
}

/** One of a few: the browser's own list, dressed. Give `options` or children. */
export function Select({
  label,
  hint,
  error,
  optional,
  id,
  className,
  options,
  children,
  ...input
}: Shared &
  ComponentProps<"select"> & { options?: readonly { value: string; label: string; disabled?: boolean }[] }) {
  const own = useId();
  return (
    <FieldShell {...{ label, hint, error, optional, className }} id={id ?? own}>
      {(tie) => (
        <span className="relative block">
          <select className={cx(BOX, "h-11 appearance-none pr-9")} {...input} {...tie}>
            {options?.map((option) => (
              <option key={option.value} value={option.value} disabled={option.disabled}>
                {option.label}
              </option>
            ))}
            {children}
          </select>
          <svg
            viewBox="0 0 12 8"
            width="12"
            height="8"
            aria-hidden="true"
            className="pointer-events-none absolute top-1/2 right-3 -translate-y-1/2 text-quiet"
          >
            <path d="m1 1.5 5 5 5-5" fill="none" stroke="currentColor" strokeWidth="1.5" />
          </svg>
        </span>
      )}
    </FieldShell>
  );
}

/** A yes or no, with its label beside it. */
export function Checkbox({
  label,
  hint,
  error,
  id,
  className,
  ...input
}: Omit<Shared, "optional"> & ComponentProps<"input">) {
  const own = useId();
  const tie = id ?? own;
  const message = errorText(error);
  return (
    <div className={cx("font-ui", className)}>
      <label htmlFor={tie} className="flex min-h-6 items-start gap-2.5 text-sm">
        <input
          type="checkbox"
          id={tie}
          className="mt-px size-5 shrink-0"
          aria-invalid={message ? true : undefined}
          aria-describedby={
            [hint ? `${tie}-hint` : "", message ? `${tie}-error` : ""].filter(Boolean).join(" ") || undefined
          }
          {...input}
        />
        <span>{label}</span>
      </label>
      {hint ? (
        <p id={`${tie}-hint`} className="mt-0.5 pl-7.5 text-xs text-quiet">
          {hint}
        </p>
      ) : null}
      {message ? <FieldMessage id={`${tie}-error`}>{message}</FieldMessage> : null}
    </div>
  );
}

export type RadioOption = {
  value: string;
  label: ReactNode;
  hint?: ReactNode;
  mark?: ReactNode;
  disabled?: boolean;
};

/** A choice of one word among a few, each with a sentence and a mark. `register("word")` spreads onto every radio. */
export function RadioCards({
  legend,
  hint,
  error,
  options,
  name,
  columns = 1,
  className,
  ...input
}: {
  legend: ReactNode;
  hint?: ReactNode;
  error?: FieldError;
  options: readonly RadioOption[];
  name: string;
  columns?: 1 | 2 | 4;
  className?: string;
} & Omit<ComponentProps<"input">, "type" | "value" | "name">) {
  const id = useId();
  const message = errorText(error);
  const { value: _ignored, ...rest } = input as ComponentProps<"input">;
  return (
    <fieldset
      className={cx("font-ui", className)}
      aria-describedby={
        [hint ? `${id}-hint` : "", message ? `${id}-error` : ""].filter(Boolean).join(" ") || undefined
      }
      aria-invalid={message ? true : undefined}
    >
      <legend className="text-sm font-medium">{legend}</legend>
      {hint ? (
        <p id={`${id}-hint`} className="mt-0.5 text-xs text-quiet">
          {hint}
        </p>
      ) : null}
      <div
        className={cx(
          "mt-2 grid gap-px border border-edge bg-rule",
          columns === 2 && "sm:grid-cols-2",
          columns === 4 && "sm:grid-cols-2 lg:grid-cols-4",
        )}
      >
        {options.map((option) => (
          <label
            key={option.value}
            className="relative flex items-start gap-3 bg-sheet px-4 py-3 hover:bg-sunk has-checked:bg-blue-wash has-checked:shadow-[inset_3px_0_0_var(--blue)] has-disabled:opacity-55 has-focus-visible:z-1 has-focus-visible:outline-2 has-focus-visible:outline-blue"
          >
            <input
              type="radio"
              name={name}
              value={option.value}
              disabled={option.disabled}
              className="mt-0.5 size-5 shrink-0 outline-none"
              {...rest}
              {...("defaultValue" in rest
                ? { defaultChecked: rest.defaultValue === option.value, defaultValue: undefined }
                : {})}
            />
            <span className="min-w-0 flex-1">
              <span className="flex items-center gap-2 font-medium">
                {option.mark}
                {option.label}
              </span>
              {option.hint ? <span className="mt-0.5 block text-xs text-quiet">{option.hint}</span> : null}
            </span>
          </label>
        ))}
      </div>
      {message ? <FieldMessage id={`${id}-error`}>{message}</FieldMessage> : null}
    </fieldset>
  );
}
