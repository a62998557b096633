import { fireEvent, render, screen, waitFor } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { useState } from 'react';
import { describe, expect, it, vi } from 'vitest';
import { Button } from '../../../app/ui/button.tsx';
import { DateTimeField } from '../../../app/ui/date-time-field.tsx';
import { ConfirmDialog } from '../../../app/ui/dialog.tsx';
import { FormErrors } from '../../../app/ui/form-errors.tsx';
import { HowSure } from '../../../app/ui/how-sure.tsx';
import { signed } from '../../../app/ui/num.tsx';
import { Tabs } from '../../../app/ui/tabs.tsx';
import { PasswordField, TextField } from '../../../app/ui/text-field.tsx';
import { ZoneProvider } from '../../../app/ui/time.tsx';

describe('how sure', () => {
  const outcomes = (place: number) => [
    { label: 'This step is it', points: place * 10 },
    { label: 'There is no fault', points: -place * 5.5 },
  ];

  it('is one slider of nine places that says where it stands', () => {
    render(<HowSure value={4} onChange={() => undefined} />);
    const slider = screen.getByRole('slider', { name: /How sure are you/ });
    expect(slider).toHaveAttribute('aria-valuetext', 'half sure');
    expect(slider).toHaveAttribute('max', '8');
  });

  it('shows what could be earned and lost at the place it stands', () => {
    render(<HowSure value={3} onChange={() => undefined} outcomes={outcomes} />);
    expect(screen.getByText('+30')).toBeInTheDocument();
    expect(screen.getByText('−17')).toBeInTheDocument();
  });

  it('tells of a change', () => {
    const onChange = vi.fn<(place: number) => void>();
    render(<HowSure value={3} onChange={onChange} />);
    fireEvent.change(screen.getByRole('slider'), { target: { value: '7' } });
    expect(onChange).toHaveBeenCalledWith(7);
  });
});

it('rounds points half away from zero', () => {
  expect([0.5, -0.5, 82.5, -57.5, 0.4, -0.4].map(signed)).toEqual(['+1', '−1', '+83', '−58', '0', '0']);
});

describe('a date and time', () => {
  function Ends({ start, onChange }: { start: string | null; onChange: (iso: string | null) => void }) {
    const [value, setValue] = useState(start);
    return (
      <ZoneProvider zone="America/New_York">
        <DateTimeField
          label="Writing ends"
          value={value}
          onChange={(iso) => {
            setValue(iso);
            onChange(iso);
          }}
        />
      </ZoneProvider>
    );
  }

  it('is shown and typed on the class’s clocks, and kept as an instant', () => {
    const onChange = vi.fn<(iso: string | null) => void>();
    render(<Ends start="2026-10-13T22:00:00.000Z" onChange={onChange} />);
    const field = screen.getByLabelText('Writing ends');
    expect(field).toHaveValue('2026-10-13T18:00');
    expect(field).toHaveAccessibleDescription('New York time');
    fireEvent.change(field, { target: { value: '2026-12-01T09:30' } });
    expect(onChange).toHaveBeenCalledWith('2026-12-01T14:30:00.000Z');
    expect(field).toHaveValue('2026-12-01T09:30');
  });

  it('shows after leaving what the clocks will show, where a typed time is skipped', () => {
    render(<Ends start={null} onChange={() => undefined} />);
    const field = screen.getByLabelText('Writing ends');
    fireEvent.change(field, { target: { value: '2026-03-08T02:30' } });
    expect(field).toHaveValue('2026-03-08T02:30');
    fireEvent.blur(field);
    expect(field).toHaveValue('2026-03-08T03:30');
  });
});

describe('fields', () => {
  it('tie what is wrong to the control', () => {
    render(<TextField label="Class code" error="No class has this code." hint="Ten characters." />);
    const field = screen.getByRole('textbox', { name: 'Class code' });
    expect(field).toBeInvalid();
    expect(field).toHaveAccessibleDescription('No class has this code. Ten characters.');
  });

  it('let a password be looked at', async () => {
    render(<PasswordField label="Password" />);
    const field = screen.getByLabelText('Password');
    expect(field).toHaveAttribute('type', 'password');
    await userEvent.click(screen.getByRole('button', { name: 'Show the password' }));
    expect(field).toHaveAttribute('type', 'text');
  });

  it('sum up what is wrong, with the focus on the summary', () => {
    render(<FormErrors fields={[{ id: 'code', label: 'Class code', message: 'No class has this code.' }]} />);
    expect(screen.getByRole('alert')).toHaveFocus();
    expect(screen.getByRole('link', { name: 'Class code' })).toHaveAttribute('href', '#code');
  });

  it('keep a busy button from being pressed twice', async () => {
    const onClick = vi.fn<() => void>();
    render(
      <Button busy onClick={onClick}>
        Handing in…
      </Button>,
    );
    await userEvent.click(screen.getByRole('button'));
    expect(onClick).not.toHaveBeenCalled();
  });
});

describe('a dialog', () => {
  function Asking({ onConfirm }: { onConfirm: () => void }) {
    const [isOpen, setOpen] = useState(false);
    return (
      <>
        <Button onClick={() => setOpen(true)}>Remove</Button>
        <ConfirmDialog
          isOpen={isOpen}
          onClose={() => setOpen(false)}
          onConfirm={onConfirm}
          grave
          title="Remove Wim from 10C?"
          confirm="Yes, remove"
          effects={['His standing is no longer shown.']}
        />
      </>
    );
  }

  it('says what it will do, acts, and gives the focus back when left', async () => {
    const onConfirm = vi.fn<() => void>();
    const user = userEvent.setup();
    render(<Asking onConfirm={onConfirm} />);
    await user.click(screen.getByRole('button', { name: 'Remove' }));
    // The first dialog is loaded when it opens.
    const dialog = await screen.findByRole('alertdialog', { name: 'Remove Wim from 10C?' }, { timeout: 8000 });
    expect(dialog).toBeInTheDocument();
    expect(screen.getByRole('list', { name: 'What it will do' })).toHaveTextContent('His standing is no longer shown.');
    await user.click(screen.getByRole('button', { name: 'Yes, remove' }));
    expect(onConfirm).toHaveBeenCalledOnce();
    await user.keyboard('{Escape}');
    await waitFor(() => expect(screen.queryByRole('alertdialog')).not.toBeInTheDocument());
    await waitFor(() => expect(screen.getByRole('button', { name: 'Remove' })).toHaveFocus());
  }, 15_000);
});

it('opens the next tab with the arrow keys', async () => {
  const user = userEvent.setup();
  render(
    <Tabs
      label="Views"
      tabs={[
        { id: 'lines', label: 'Lines', panel: 'The lines' },
        { id: 'findings', label: 'Findings', count: 2, panel: 'The findings' },
      ]}
    />,
  );
  await user.click(screen.getByRole('tab', { name: 'Lines' }));
  await user.keyboard('{ArrowRight}');
  expect(screen.getByRole('tab', { name: 'Findings 2', selected: true })).toHaveFocus();
  expect(screen.getByRole('tabpanel', { name: 'Findings 2' })).toHaveTextContent('The findings');
});
