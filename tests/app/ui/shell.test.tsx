import { render, screen } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { MemoryRouter } from 'react-router-dom';
import { afterEach, describe, expect, it } from 'vitest';
import { applyTheme } from '../../../app/lib/theme.ts';
import { Shell } from '../../../app/ui/shell.tsx';

function shell(at: string) {
  return (
    <MemoryRouter initialEntries={[at]}>
      <Shell
        nav={[
          { to: '/', label: 'Today', also: ['/rounds'] },
          { to: '/disputes', label: 'Disputes', count: 5 },
        ]}
        who={{ name: 'Mira Castellan', place: '10C' }}
      >
        <h1>A page</h1>
      </Shell>
    </MemoryRouter>
  );
}

describe('the shell', () => {
  afterEach(() => {
    localStorage.clear();
    applyTheme();
  });

  it('marks the word where one is, also on the pages that belong to it', () => {
    render(shell('/rounds/r1/write'));
    expect(screen.getByRole('link', { name: 'Today' })).toHaveAttribute('aria-current', 'page');
    expect(screen.getByRole('link', { name: 'Disputes 5' })).not.toHaveAttribute('aria-current');
  });

  it('offers a way past the bar', () => {
    render(shell('/'));
    expect(screen.getByRole('link', { name: 'Skip to the page' })).toHaveAttribute('href', '#main');
    expect(screen.getByRole('main')).toHaveAttribute('id', 'main');
  });

  it('follows the device until a theme is chosen, and keeps the choice', async () => {
    render(shell('/'));
    expect(screen.getByRole('radio', { name: 'As the device' })).toBeChecked();
    await userEvent.click(screen.getByRole('radio', { name: 'Dark' }));
    expect(document.documentElement).toHaveAttribute('data-theme', 'dark');
    expect(localStorage.getItem('slipstone.theme')).toBe('dark');
    await userEvent.click(screen.getByRole('radio', { name: 'As the device' }));
    expect(localStorage.getItem('slipstone.theme')).toBeNull();
  });
});
