"use client";

import { useId, useRef, useState, type ClipboardEvent, type KeyboardEvent, type ReactNode } from "react";

import { cx } from "@/components/cx";
import {
  cellAfter,
  cellAt,
  cellNames,
  cellsOf,
  EMPTY_CELLS,
  kindOf,
  negated,
  notationOf,
  type CgOrder,
  type SymbolKind,
} from "@/components/symbol-notation";

const TITLE: Record<SymbolKind, string> = { "3j": "3j symbol", cg: "Clebsch-Gordan coefficient" };

/**
 * An input that looks like the printed symbol. Arrow keys walk between the cells, a slash makes a half, a space goes on,
 * pasted notation (typed or LaTeX) fills the grid. Speaks typed notation with its owner: `value` in, `onChange` out.
 * @param errorAt offset in `value` where reading failed; that cell is marked
 * @param onOtherKind called when a symbol of the other kind is pasted
 */
export function SymbolGrid({
  kind,
  cgOrder = "j1m1j2m2",
  value,
  onChange,
  errorAt = null,
  onOtherKind,
  id,
  describedBy,
  label,
}: {
  kind: SymbolKind;
  cgOrder?: CgOrder;
  value: string;
  onChange: (text: string) => void;
  errorAt?: number | null;
  onOtherKind?: (kind: SymbolKind, text: string) => void;
  id?: string;
  describedBy?: string;
  label?: string;
}) {
  const own = useId();
  const base = id ?? own;
  const inputs = useRef<(HTMLInputElement | null)[]>([]);
  const active = useRef(0);
  const [cells, setCells] = useState<readonly string[]>(() => cellsOf(kind, value) ?? EMPTY_CELLS);
  // What the cells stand for: a value from outside that differs replaces them, our own change coming back does not.
  const [spoken, setSpoken] = useState({ kind, value });
  if (spoken.kind !== kind || spoken.value !== value) {
    setSpoken({ kind, value });
    setCells(cellsOf(kind, value) ?? EMPTY_CELLS);
  }

  const names = cellNames(kind, cgOrder);
  const faulty = errorAt === null ? null : cellAt(kind, cells, errorAt);

  function put(next: readonly string[]) {
    const text = notationOf(kind, next);
    setCells(next);
    setSpoken({ kind, value: text });
    onChange(text);
  }

  function go(to: number) {
    const input = inputs.current[to];
    if (!input) return;
    input.focus();
    input.select();
  }

  function change(i: number, typed: string) {
    const goesOn = /[\s,;|]$/.test(typed);
    const before = cells[i] ?? "";
    const after = cellAfter(before, typed);
    if (after !== before) put(cells.map((cell, k) => (k === i ? after : cell)));
    if (goesOn) go(i + 1);
  }

  function press(event: KeyboardEvent<HTMLInputElement>, i: number) {
    const { selectionStart, selectionEnd, value: text } = event.currentTarget;
    const whole = selectionStart === 0 && selectionEnd === text.length;
    const atStart = selectionStart === 0 && (whole || selectionEnd === 0);
    const atEnd = selectionEnd === text.length && (whole || selectionStart === text.length);
    const to =
      event.key === "ArrowLeft" && atStart
        ? i - 1
        : event.key === "ArrowRight" && atEnd
          ? i + 1
          : event.key === "ArrowUp" && kind === "3j"
            ? i - 3
            : event.key === "ArrowDown" && kind === "3j"
              ? i + 3
              : event.key === "Backspace" && text === ""
                ? i - 1
                : null;
    if (to === null || event.ctrlKey || event.metaKey || event.altKey || event.shiftKey) return;
    if (to < 0 || to > 5) return;
    event.preventDefault();
    go(to);
  }

  function paste(event: ClipboardEvent<HTMLInputElement>, i: number) {
    const text = event.clipboardData.getData("text").slice(0, 4_000);
    const found = kindOf(text);
    const filled = cellsOf(kind, text);
    if (filled) {
      event.preventDefault();
      put(filled);
      go(5);
      return;
    }
    if (found && found !== kind && onOtherKind && cellsOf(found, text)) {
      event.preventDefault();
      onOtherKind(found, text);
      return;
    }
    const entries = text.trim().split(/[\s,;]+/);
    if (
      entries.length < 2 ||
      entries.length > 6 - i ||
      !entries.every((entry) => /^[-−]?[\d./½]+$/.test(entry))
    )
      return;
    event.preventDefault();
    put(
      cells.map((cell, k) => (k >= i && k < i + entries.length ? cellAfter("", entries[k - i] ?? "") : cell)),
    );
    go(Math.min(5, i + entries.length - 1));
  }

  const cell = (i: number) => {
    const name = names[i] ?? "";
    const text = cells[i] ?? "";
    return (
      <span key={name} className="relative block min-w-0">
        <input
          ref={(element) => {
            inputs.current[i] = element;
          }}
          id={i === 0 ? base : `${base}-${i}`}
          value={text}
          onChange={(event) => change(i, event.target.value)}
          onKeyDown={(event) => press(event, i)}
          onPaste={(event) => paste(event, i)}
          onFocus={(event) => {
            active.current = i;
            event.currentTarget.select();
          }}
          aria-label={name}
          aria-invalid={faulty === i || undefined}
          aria-describedby={describedBy}
          inputMode="decimal"
          autoComplete="off"
          autoCapitalize="off"
          spellCheck={false}
          maxLength={12}
          placeholder=" "
          className={cx(
            "peer block h-11 w-full min-w-0 rounded-xs border border-dotted border-edge bg-transparent px-0.5 text-center font-work text-lg",
            "hover:bg-sunk/60 focus:border-solid focus:border-blue focus:bg-blue-wash focus:outline-2 focus:-outline-offset-1 focus:outline-blue",
            "aria-invalid:border-2 aria-invalid:border-solid aria-invalid:border-red aria-invalid:bg-red-wash aria-invalid:text-red",
          )}
        />
        <span
          aria-hidden="true"
          className="pointer-events-none absolute inset-0 hidden place-items-center text-base text-quiet italic opacity-70 peer-placeholder-shown:grid peer-focus:opacity-40"
        >
          <span>
            {name.charAt(0)}
            <sub className="text-[0.65em] not-italic">{name.slice(1)}</sub>
          </span>
        </span>
      </span>
    );
  };

  return (
    <div role="group" aria-label={label ?? TITLE[kind]} className="inline-block max-w-full">
      {kind === "3j" ? (
        <span className="flex items-stretch gap-1">
          <Paren side="left" />
          <span className="grid w-44 grid-cols-3 gap-x-2 gap-y-1 py-1">{[0, 1, 2, 3, 4, 5].map(cell)}</span>
          <Paren side="right" />
        </span>
      ) : (
        <span className="flex items-stretch gap-1">
          <Angle side="left" />
          <span className="grid w-42 grid-cols-4 gap-x-1.5 py-1 sm:w-52">{[0, 1, 2, 3].map(cell)}</span>
          <span aria-hidden="true" className="mx-1 w-px bg-ink" />
          <span className="grid w-20 grid-cols-2 gap-x-1.5 py-1 sm:w-26">{[4, 5].map(cell)}</span>
          <Angle side="right" />
        </span>
      )}
      <span className="mt-1.5 flex justify-center gap-1">
        <CellKey
          says="Change the sign of this cell"
          onPress={() => {
            put(cells.map((text, k) => (k === active.current ? negated(text) : text)));
            inputs.current[active.current]?.focus();
          }}
        >
          ±
        </CellKey>
        <CellKey
          says="Make a half of this cell"
          onPress={() => {
            put(
              cells.map((text, k) =>
                k === active.current ? cellAfter(text, `${text.replace(/\/2$/, "")}/`) : text,
              ),
            );
            inputs.current[active.current]?.focus();
          }}
        >
          ⁄2
        </CellKey>
      </span>
    </div>
  );
}

/** A key beside the grid for what a phone's number pad lacks; the cell keeps the focus. */
function CellKey({ says, onPress, children }: { says: string; onPress: () => void; children: ReactNode }) {
  return (
    <button
      type="button"
      aria-label={says}
      title={says}
      onPointerDown={(event) => event.preventDefault()}
      onClick={onPress}
      className="min-h-8 min-w-10 rounded-xs border border-rule font-work text-sm text-quiet hover:border-edge hover:text-ink"
    >
      {children}
    </button>
  );
}

function Paren({ side }: { side: "left" | "right" }) {
  return (
    <Fence side={side} viewBox="0 0 14 100" width="w-3.5">
      <path d="M13.2 0C-1.6 24-1.6 76 13.2 100l.6-.7C3.4 76 3.4 24 13.8.7z" className="fill-ink" />
    </Fence>
  );
}

function Angle({ side }: { side: "left" | "right" }) {
  return (
    <Fence side={side} viewBox="0 0 12 100" width="w-2.5">
      <path
        d="M11 0 1.5 50 11 100"
        fill="none"
        strokeWidth="1.5"
        vectorEffect="non-scaling-stroke"
        className="stroke-ink"
      />
    </Fence>
  );
}

/** A bracket as tall as what it encloses. */
function Fence({
  side,
  viewBox,
  width,
  children,
}: {
  side: "left" | "right";
  viewBox: string;
  width: string;
  children: ReactNode;
}) {
  return (
    <span aria-hidden="true" className={cx("relative block shrink-0 self-stretch", width)}>
      <svg
        viewBox={viewBox}
        preserveAspectRatio="none"
        className={cx("absolute inset-0 size-full", side === "right" && "-scale-x-100")}
      >
        {children}
      </svg>
    </span>
  );
}
