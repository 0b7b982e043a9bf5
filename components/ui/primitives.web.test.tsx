import { act, fireEvent, render, screen } from '@testing-library/react';
import type { ReactNode } from 'react';
import { CommandsProvider, useCommands } from './commands/CommandsProvider';
import { Field } from './Field';
import { Quantity } from './Quantity';
import { Table } from './Table';
import { Text } from './Text';
import { ThemeProvider, useTheme } from './theme';
import { themes } from './tokens';

const show = (children: ReactNode) => render(<ThemeProvider initial="dome">{children}</ThemeProvider>);

test('a sortable column says how it is sorted, and a press on its head asks for it', () => {
  const onSort = jest.fn();
  const columns = ['a', 'b'].map((key) => ({
    key,
    label: key,
    width: 50,
    sortable: true,
    cell: (row: { id: string }) => <Text>{row.id + key}</Text>,
  }));
  show(
    <Table
      label="Rows"
      columns={columns}
      rows={[{ id: '1' }]}
      rowKey={(r) => r.id}
      sort={{ key: 'a', order: 'down' }}
      onSort={onSort}
    />,
  );
  expect(screen.getAllByRole('columnheader').map((h) => h.getAttribute('aria-sort'))).toEqual([
    'descending',
    'none',
  ]);
  fireEvent.click(screen.getByRole('button', { name: 'b' }));
  expect(onSort).toHaveBeenCalledWith('b');
  expect(screen.getAllByRole('cell').map((c) => c.textContent)).toEqual(['1a', '1b']);
});

test('the problem of a field is read out with it', () => {
  show(<Field label="Distance" unit="pc" value="x" problem="A distance in parsecs." />);
  const field = screen.getByLabelText('Distance, pc');
  expect(field.getAttribute('aria-invalid')).toBe('true');
  const described = field.getAttribute('aria-describedby')!;
  expect(document.getElementById(described)?.textContent).toBe('A distance in parsecs.');
});

test('a quantity is heard in words, and one that is not known is said to be so', () => {
  show(
    <>
      <Quantity quantity={{ value: 18.43, se: 0.71, unit: 'km/s' }} />
      <Quantity quantity={null} />
    </>,
  );
  expect(screen.getByLabelText('18.4 plus or minus 0.7 kilometres per second').textContent).toContain('18.4');
  expect(screen.getByLabelText('not known')).toBeTruthy();
});

function WithCommand({ perform }: { perform: () => void }) {
  useCommands([{ name: 'next', label: 'Next channel', keys: ['ArrowRight'], perform }]);
  return <input aria-label="name" />;
}

test('a key performs its command, but not while somebody types; ? lists it', () => {
  const perform = jest.fn();
  show(
    <CommandsProvider>
      <WithCommand perform={perform} />
    </CommandsProvider>,
  );
  fireEvent.keyDown(screen.getByLabelText('name'), { key: 'ArrowRight' });
  expect(perform).not.toHaveBeenCalled();
  fireEvent.keyDown(document.body, { key: 'ArrowRight' });
  expect(perform).toHaveBeenCalledTimes(1);
  fireEvent.keyDown(document.body, { key: '?' });
  expect(screen.getByText('Next channel')).toBeTruthy();
});

test('the theme is the chosen one, is kept, and paints the page', () => {
  let choose: ReturnType<typeof useTheme>['choose'] = () => undefined;
  function Probe() {
    const theme = useTheme();
    choose = theme.choose;
    return <>{theme.color.ground}</>;
  }
  const { container } = show(<Probe />);
  expect(container.textContent).toBe(themes.dome.ground);
  act(() => choose('paper'));
  expect(container.textContent).toBe(themes.paper.ground);
  expect(localStorage.getItem('outswell.theme')).toBe('paper');
  expect(document.getElementById('outswell-theme')?.textContent).toContain(themes.paper.ground);
  act(() => choose('system'));
  expect(localStorage.getItem('outswell.theme')).toBeNull();
});
