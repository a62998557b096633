import { useEffect, useImperativeHandle, useLayoutEffect, useRef, useState, type Ref } from 'react';
import { renderToString } from 'katex';
import { MathsFieldKeys } from './maths-field-keys.tsx';
import {
  loadMathsFields,
  makeMathsField,
  settleMathsField,
  type MathsFieldClass,
  type MathsFieldElement,
} from './maths-field-library.ts';
import { useLinger } from './use-linger.ts';
import './maths-field.css';

export type MoveOutDirection = 'forward' | 'backward' | 'upward' | 'downward';

export interface MathsFieldHandle {
  focus(): void;
  /** Puts TeX in at the caret; `#?` stands for an empty place. */
  insert(tex: string): void;
}

export interface MathsFieldProps {
  /** One line of TeX. */
  readonly value: string;
  readonly onChange: (tex: string) => void;
  readonly label: string;
  readonly describedBy?: string;
  readonly decimal?: 'point' | 'comma';
  /** Without it, Enter does what it does in any form. */
  readonly onEnter?: () => void;
  /** An arrow at the end of the field; without it the caret stays. */
  readonly onMoveOut?: (direction: MoveOutDirection) => void;
  readonly onFocus?: () => void;
  readonly onBlur?: () => void;
  readonly focusOnMount?: boolean;
  /** Where the caret stands after `focusOnMount`. Default: the end. */
  readonly caret?: 'start' | 'end';
  readonly readOnly?: boolean;
  readonly invalid?: boolean;
  /** Shows the row of keys under the field while it is in hand. */
  readonly keys?: boolean;
  readonly handle?: Ref<MathsFieldHandle>;
}

type Stage = 'loading' | 'ready' | 'plain';

/**
 * A field for one line of maths. Until its library is there the line is shown as it will look; where the library
 * cannot be had (no connection, an old browser) the TeX itself can be written instead.
 */
export function MathsField(props: MathsFieldProps) {
  const host = useRef<HTMLDivElement>(null);
  const plain = useRef<HTMLInputElement>(null);
  const field = useRef<MathsFieldElement | null>(null);
  const latest = useRef(props);
  const shown = useRef(props.value);
  const [stage, setStage] = useState<Stage>('loading');
  const [inHand, setInHand] = useState(false);
  const hasKeys = useLinger(inHand);
  useLayoutEffect(() => {
    latest.current = props;
  });

  useImperativeHandle(props.handle, () => ({
    focus: () => (field.current ?? plain.current)?.focus(),
    insert: (tex) => field.current?.insert(tex, { focus: true, scrollIntoView: true, selectionMode: 'placeholder' }),
  }));

  useEffect(() => {
    let gone = false;
    let stop: (() => void) | undefined;
    loadMathsFields().then(
      (element) => {
        if (gone || !host.current) return;
        const made = makeMathsField(element);
        field.current = made;
        stop = connect(made, element, host.current, latest, shown);
        setStage('ready');
      },
      () => gone || setStage('plain'),
    );
    return () => {
      gone = true;
      stop?.();
      field.current = null;
    };
  }, []);

  useEffect(() => {
    if (stage === 'plain' && latest.current.focusOnMount) plain.current?.focus();
  }, [stage]);

  const { value, label, describedBy, readOnly, invalid, decimal } = props;
  useEffect(() => {
    const made = field.current;
    if (!made || stage !== 'ready') return;
    if (value !== shown.current) {
      shown.current = value;
      made.setValue(value, { silenceNotifications: true });
    }
    made.readOnly = readOnly ?? false;
    made.setAttribute('aria-label', label);
    setOrDrop(made, 'aria-describedby', describedBy);
    setOrDrop(made, 'aria-invalid', invalid ? 'true' : undefined);
  }, [stage, value, label, describedBy, readOnly, invalid, decimal]);

  return (
    <div
      className={inHand && !readOnly ? 'maths-field slate' : 'maths-field'}
      data-invalid={invalid || undefined}
      data-read-only={readOnly || undefined}
      onFocus={() => setInHand(true)}
      onBlur={() => setInHand(false)}
    >
      <div
        className="maths-field-box"
        onPointerDown={(event) => {
          // A press beside the line puts the caret at its end.
          if (event.target === event.currentTarget && field.current) {
            event.preventDefault();
            field.current.focus();
            field.current.executeCommand('moveToMathfieldEnd');
          }
        }}
      >
        <div ref={host} className="contents" />
        {stage === 'loading' && <Preview tex={value} />}
        {stage === 'plain' && <PlainField {...props} field={plain} />}
      </div>
      {props.keys && hasKeys && stage === 'ready' && (
        <MathsFieldKeys
          onPress={(tex) =>
            field.current?.insert(tex, { focus: true, scrollIntoView: true, selectionMode: 'placeholder' })
          }
        />
      )}
    </div>
  );
}

interface Latest {
  readonly current: MathsFieldProps;
}

function connect(
  field: MathsFieldElement,
  element: MathsFieldClass,
  host: HTMLElement,
  latest: Latest,
  shown: { current: string },
): () => void {
  const comma = () => {
    element.decimalSeparator = latest.current.decimal === 'comma' ? ',' : '.';
  };
  comma();
  shown.current = latest.current.value;
  field.value = latest.current.value;
  field.addEventListener('input', () => {
    shown.current = field.getValue('latex-without-placeholders');
    latest.current.onChange(shown.current);
  });
  field.addEventListener('focusin', () => {
    comma();
    latest.current.onFocus?.();
  });
  field.addEventListener('focusout', () => latest.current.onBlur?.());
  let key = '';
  field.addEventListener('move-out', (event) => {
    // Tab leaves as it does anywhere; an arrow leaves only where somebody says where to.
    if (key === 'Tab') return;
    event.preventDefault();
    latest.current.onMoveOut?.(event.detail.direction);
  });
  field.addEventListener(
    'keydown',
    (event) => {
      key = event.key;
      onKey(event, field, latest);
    },
    { capture: true },
  );
  // The on-screen return key ends the line as Enter does, without a key press.
  field.addEventListener('change', () => {
    if (field.hasFocus() && window.mathVirtualKeyboard.visible) latest.current.onEnter?.();
  });
  host.append(field);
  settleMathsField(field);
  if (latest.current.focusOnMount) {
    field.focus();
    field.executeCommand(latest.current.caret === 'start' ? 'moveToMathfieldStart' : 'moveToMathfieldEnd');
  }
  return () => field.remove();
}

function onKey(event: KeyboardEvent, field: MathsFieldElement, latest: Latest): void {
  if (event.isComposing || field.mode === 'latex') return;
  const plainEnter = event.key === 'Enter' && !event.shiftKey && !event.altKey && !event.ctrlKey && !event.metaKey;
  if (!plainEnter || !latest.current.onEnter) return;
  event.preventDefault();
  event.stopPropagation();
  latest.current.onEnter();
}

function setOrDrop(element: HTMLElement, name: string, value: string | undefined): void {
  if (value === undefined) element.removeAttribute(name);
  else element.setAttribute(name, value);
}

function Preview({ tex }: { readonly tex: string }) {
  const html = renderToString(`\\displaystyle ${tex}`, { throwOnError: false, output: 'htmlAndMathml' });
  return <span aria-busy="true" dangerouslySetInnerHTML={{ __html: html }} />;
}

function PlainField({ field, ...props }: MathsFieldProps & { readonly field: Ref<HTMLInputElement> }) {
  return (
    <input
      ref={field}
      type="text"
      value={props.value}
      aria-label={props.label}
      aria-describedby={props.describedBy}
      aria-invalid={props.invalid || undefined}
      readOnly={props.readOnly}
      autoComplete="off"
      autoCapitalize="off"
      spellCheck={false}
      onChange={(event) => props.onChange(event.target.value)}
      onFocus={props.onFocus}
      onBlur={props.onBlur}
      onKeyDown={(event) => {
        if (event.key === 'Enter' && props.onEnter && !event.nativeEvent.isComposing) {
          event.preventDefault();
          props.onEnter();
        } else if (event.key === 'ArrowUp' || event.key === 'ArrowDown') {
          if (!props.onMoveOut) return;
          event.preventDefault();
          props.onMoveOut(event.key === 'ArrowUp' ? 'upward' : 'downward');
        }
      }}
    />
  );
}
