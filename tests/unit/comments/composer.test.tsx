import { fireEvent, render, screen } from '@testing-library/react';
import { describe, expect, it, vi } from 'vitest';
import { Composer } from '@/components/comments/Composer';

const PEOPLE = [
  { id: '1', name: 'Bram Festerley', role: 'designer' },
  { id: '2', name: 'Nerys Quillamore', role: 'client' },
] as const;

const composed = (onSend = vi.fn(async () => {}), error: Error | null = null) => {
  render(
    <Composer
      label="Comment"
      send="Send"
      people={PEOPLE}
      busy={false}
      error={error}
      onSend={onSend}
    />,
  );
  return { area: screen.getByRole<HTMLTextAreaElement>('combobox'), onSend };
};

const type = (area: HTMLTextAreaElement, value: string) =>
  fireEvent.change(area, { target: { value, selectionStart: value.length } });

describe('writing a comment', () => {
  it('offers people after an @ and takes the one picked with the keys', () => {
    const { area } = composed();
    type(area, 'Well @');
    expect(screen.getAllByRole('option')).toHaveLength(2);
    fireEvent.keyDown(area, { key: 'ArrowDown' });
    expect(area.getAttribute('aria-activedescendant')).toBe(
      screen.getByRole('option', { selected: true }).id,
    );
    fireEvent.keyDown(area, { key: 'Enter' });
    expect(area.value).toBe('Well @Nerys Quillamore ');
    expect(screen.queryAllByRole('option')).toHaveLength(0);
  });

  it('leaves the list by Escape and keeps what is typed', () => {
    const { area } = composed();
    type(area, '@b');
    fireEvent.keyDown(area, { key: 'Escape' });
    expect(screen.queryAllByRole('option')).toHaveLength(0);
    expect(area.value).toBe('@b');
  });

  it('sends what is written once, trimmed, and nothing when there is nothing', async () => {
    const { area, onSend } = composed();
    type(area, '   ');
    fireEvent.submit(area.closest('form')!);
    expect(onSend).not.toHaveBeenCalled();
    type(area, ' Good. ');
    fireEvent.keyDown(area, { key: 'Enter', ctrlKey: true });
    await vi.waitFor(() => expect(area.value).toBe(''));
    expect(onSend.mock.calls).toEqual([['Good.']]);
  });

  it('keeps what was written when it could not be sent', async () => {
    const { area } = composed(
      vi.fn(async () => Promise.reject(new Error('no'))),
      new Error('The server could not be reached.'),
    );
    type(area, 'Keep me');
    fireEvent.submit(area.closest('form')!);
    await Promise.resolve();
    expect(area.value).toBe('Keep me');
    expect(screen.getByRole('alert').textContent).toContain('still here');
  });
});
