import type { KeyboardEvent, ReactNode } from 'react';
import { useId, useState } from 'react';

export interface TabItem {
  readonly id: string;
  readonly label: string;
  readonly count?: number;
  readonly panel: ReactNode;
}

export interface TabsProps {
  readonly label: string;
  readonly tabs: readonly TabItem[];
  /** The open tab, where the page keeps it; else the first is open. */
  readonly value?: string;
  readonly onChange?: (id: string) => void;
}

/** Several views of one thing; the open one has the stroke. */
export function Tabs({ label, tabs, value, onChange }: TabsProps) {
  const base = useId();
  const [own, setOwn] = useState(tabs[0]?.id);
  const openId = value ?? own;
  const open = tabs.find((tab) => tab.id === openId) ?? tabs[0];
  const choose = (id: string) => {
    setOwn(id);
    onChange?.(id);
  };
  const onKeyDown = (event: KeyboardEvent<HTMLDivElement>) => {
    const by = { ArrowLeft: -1, ArrowRight: 1 }[event.key];
    if (!by || !open) return;
    event.preventDefault();
    const next = tabs[(tabs.indexOf(open) + by + tabs.length) % tabs.length];
    if (!next) return;
    choose(next.id);
    document.getElementById(`${base}-${next.id}`)?.focus();
  };
  return (
    <>
      <div className="tabs" role="tablist" aria-label={label} tabIndex={-1} onKeyDown={onKeyDown}>
        {tabs.map((tab) => (
          <button
            key={tab.id}
            id={`${base}-${tab.id}`}
            type="button"
            role="tab"
            className="stroke"
            aria-selected={tab === open}
            aria-controls={`${base}-panel`}
            tabIndex={tab === open ? 0 : -1}
            onClick={() => choose(tab.id)}
          >
            {tab.label}
            {tab.count === undefined ? null : ' '}
            {tab.count === undefined ? null : <span className="count">{tab.count}</span>}
          </button>
        ))}
      </div>
      {open ? (
        <div id={`${base}-panel`} role="tabpanel" aria-labelledby={`${base}-${open.id}`} className="pt-5">
          {open.panel}
        </div>
      ) : null}
    </>
  );
}
