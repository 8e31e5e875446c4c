import { fireEvent, render, screen } from '@testing-library/react';
import { describe, expect, it, vi } from 'vitest';
import { currentItem } from '@/components/shell/nav-links';
import { SignInForm } from '@/components/shell/sign-in-form';
import { ProgressRule } from '@/components/states/progress-rule';
import { StateMark } from '@/components/states/state-mark';
import { CopyFull } from '@/components/ui/copy-full';
import { Field } from '@/components/ui/field';
import { Figure } from '@/components/ui/figure';
import { Input } from '@/components/ui/input';
import { STATE_WORDS, type RowState } from '@/lib/rules/states';
import { themeOf } from '@/lib/rules/themes';

describe('currentItem', () => {
  const items = [
    { href: '/shows/tarn', label: 'Parts' },
    { href: '/shows/tarn/import', label: 'Import' },
  ];

  it.each([
    ['/shows/tarn', 'Parts'],
    ['/shows/tarn/assets/ox/head', 'Parts'],
    ['/shows/tarn/import', 'Import'],
    ['/shows/tarnished', undefined],
  ])('of %s is %s', (path, label) => expect(currentItem(items, path)?.label).toBe(label));
});

describe('StateMark', () => {
  it('has a shape of its own for every state', () => {
    const shapes = (Object.keys(STATE_WORDS) as RowState[]).map((state) => {
      const { container } = render(<StateMark state={state} />);
      expect(container).toHaveTextContent(STATE_WORDS[state]);
      return container.querySelector('svg')!.innerHTML;
    });
    expect(new Set(shapes).size).toBe(shapes.length);
  });
});

describe('ProgressRule', () => {
  it('tells every count in words, and nothing of an empty show', () => {
    const { container, unmount } = render(<ProgressRule counts={{ approved: 61, unset: 14, left_out: 2 }} />);
    expect([...container.querySelectorAll('li')].map((item) => item.textContent)).toEqual([
      '61 approved',
      '14 no mass yet',
      '2 left out',
    ]);
    unmount();
    expect(render(<ProgressRule counts={{}} />).container).toBeEmptyDOMElement();
  });
});

describe('Field', () => {
  it('ties label, error and hint to its control', () => {
    render(
      <Field label="Density" unit="kg/m3" hint="of the solid" error="This is no density.">
        <Input />
      </Field>,
    );
    const control = screen.getByLabelText(/Density/);
    expect(control).toHaveAccessibleDescription('of the solid This is no density.');
    expect(control).toBeInvalid();
  });
});

describe('copying', () => {
  function copied(select: (root: HTMLElement) => Range): string {
    const { container } = render(
      <CopyFull>
        <table>
          <tbody>
            <tr>
              <td>head</td>
              <td>
                <Figure value={1 / 3} />
              </td>
              <td>
                <Figure value={0.00123456789} notation="engineering" />
              </td>
            </tr>
          </tbody>
        </table>
      </CopyFull>,
    );
    const selection = document.getSelection()!;
    selection.removeAllRanges();
    selection.addRange(select(container));
    const setData = vi.fn();
    fireEvent.copy(container.querySelector('td')!, { clipboardData: { setData } });
    return String(setData.mock.calls[0]?.[1]);
  }

  it('takes all digits of one figure', () => {
    const text = copied((root) => {
      const range = document.createRange();
      range.selectNodeContents(root.querySelector('[data-full]')!.firstChild!);
      return range;
    });
    expect(Number(text)).toBe(1 / 3);
  });

  it('takes all digits of a row, cells parted by tabs', () => {
    const text = copied((root) => {
      const range = document.createRange();
      range.selectNodeContents(root.querySelector('tbody')!);
      return range;
    });
    expect(text.split('\t')).toEqual(['head', String(1 / 3), String(0.00123456789)]);
  });
});

describe('SignInForm', () => {
  it('shows a refusal at the password and keeps the e-mail', async () => {
    const onSignIn = vi.fn(() => Promise.resolve('E-mail or password is wrong.'));
    render(<SignInForm onSignIn={onSignIn} />);
    fireEvent.change(screen.getByLabelText('E-mail'), { target: { value: 'mara@studio.example' } });
    fireEvent.change(screen.getByLabelText('Password'), { target: { value: 'secret' } });
    fireEvent.submit(screen.getByLabelText('Password').closest('form')!);
    expect(await screen.findByText('E-mail or password is wrong.')).toBeInTheDocument();
    expect(onSignIn).toHaveBeenCalledWith('mara@studio.example', 'secret');
    expect(screen.getByLabelText('E-mail')).toHaveValue('mara@studio.example');
  });
});

describe('themeOf', () => {
  it.each([
    ['light', 'light'],
    ['system', 'system'],
    ['dark', 'dark'],
    [undefined, 'dark'],
    ['"><script>', 'dark'],
  ])('of %s is %s', (cookie, theme) => expect(themeOf(cookie)).toBe(theme));
});
