import { act, render, renderHook, screen, waitFor } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { describe, expect, it, vi } from 'vitest';
import { z } from 'zod';
import { ApiError } from '../lib/api';
import { renderPart } from '../testing/renderRoute';
import { CosmicTimeStrip } from './CosmicTimeStrip';
import { DataTable, type DataTableProps, type TableColumn } from './DataTable';
import { Loaded, type QueryState } from './PageStates';
import { Quantity } from './Quantity';
import { RedshiftValue } from './RedshiftValue';
import { SectionChain } from './SectionChain';
import { NumberField } from './form/fields';
import { SaveStatus } from './form/SaveStatus';
import { useAutosave } from './form/useAutosave';
import { useZodForm } from './form/useZodForm';
import { PlotFrame } from './plot/PlotFrame';

const fault = new ApiError({ code: 'internal', status: 500, message: 'Something broke.', errorId: 'e-9' });

describe('DataTable', () => {
  interface Row {
    name: string;
    hours: number;
  }
  const columns: TableColumn<Row>[] = [
    { field: 'name', headerName: 'Name', width: 100 },
    { field: 'hours', headerName: 'Time', unit: 'h', numeric: true, computed: true, width: 100 },
  ];
  const table = (props: Partial<DataTableProps<Row>>) =>
    renderPart(
      <DataTable<Row>
        label="Targets"
        what="targets"
        columns={columns}
        rows={undefined}
        getRowId={(row) => row.name}
        empty={<p>Nothing yet</p>}
        {...props}
      />,
    );

  it('is busy while pending', () => {
    const { container } = table({});
    expect(container.querySelector('[aria-busy="true"]')).toBeInTheDocument();
    expect(screen.queryByText('Nothing yet')).not.toBeInTheDocument();
  });

  it('says what failed, with the reference and a way to try again', async () => {
    const onRetry = vi.fn();
    table({ error: fault, onRetry });
    expect(screen.getByRole('alert')).toHaveTextContent('The targets could not be loaded. Something broke.');
    expect(screen.getByText('e-9')).toBeVisible();
    await userEvent.click(screen.getByRole('button', { name: 'Retry' }));
    expect(onRetry).toHaveBeenCalledOnce();
  });

  it('keeps old rows when they cannot be refreshed', () => {
    table({ rows: [{ name: 'A', hours: 3 }], error: fault });
    expect(screen.getByText('A')).toBeInTheDocument();
    expect(screen.getByRole('status')).toHaveTextContent('could not be refreshed');
  });

  it('tells nothing at all from nothing that matches', async () => {
    table({ rows: [] });
    expect(screen.getByText('Nothing yet')).toBeVisible();
  });

  it('offers to clear the filters when nothing matches', async () => {
    const onClearFilters = vi.fn();
    table({ rows: [], isFiltered: true, onClearFilters });
    expect(screen.queryByText('Nothing yet')).not.toBeInTheDocument();
    await userEvent.click(screen.getByRole('button', { name: 'Clear filters' }));
    expect(onClearFilters).toHaveBeenCalledOnce();
  });

  it('draws rows, and names a column with its unit', () => {
    table({ rows: [{ name: 'A', hours: 3 }] });
    expect(screen.getByRole('grid', { name: 'Targets' })).toBeVisible();
    expect(screen.getByRole('columnheader', { name: 'Time h' })).toBeInTheDocument();
    expect(screen.getByRole('gridcell', { name: '3' })).toHaveClass('computed');
  });
});

describe('Loaded', () => {
  const states: [string, Partial<QueryState<string>>, string][] = [
    ['failed', { error: fault }, 'The thing could not be loaded'],
    ['missing', { error: new ApiError({ code: 'not-found', status: 404, message: '' }) }, 'There is nothing here'],
    ['stale', { data: 'old', error: fault }, 'may be out of date'],
    ['ready', { data: 'fresh' }, 'fresh'],
  ];
  it.each(states)('%s', (_name, state, text) => {
    renderPart(
      <Loaded query={{ data: undefined, error: null, isFetching: false, refetch: vi.fn(), ...state }} what="The thing">
        {(data: string) => <p>{data}</p>}
      </Loaded>,
    );
    expect(screen.getByText(new RegExp(text))).toBeVisible();
  });

  it('pending is announced as busy', () => {
    const { container } = renderPart(
      <Loaded query={{ data: undefined, error: null, isFetching: true, refetch: vi.fn() }} what="The thing">
        {() => null}
      </Loaded>,
    );
    expect(container.querySelector('[aria-busy="true"]')).toBeInTheDocument();
  });
});

describe('numbers', () => {
  it('open to formula, inputs and source with the keyboard', async () => {
    renderPart(
      <Quantity
        value={-2.5}
        unit="mag"
        decimals={2}
        explanation={{
          title: 'Band shift',
          formula: '−2.5 log(1+z)',
          inputs: [{ label: 'z', value: '9' }],
          source: 'a paper',
        }}
      />,
    );
    const button = screen.getByRole('button', { name: /−2\.50\s*mag/ });
    button.focus();
    await userEvent.keyboard('{Enter}');
    expect(await screen.findByRole('dialog', { name: 'Band shift' })).toHaveTextContent('Source: a paper');
    await userEvent.keyboard('{Escape}');
    await waitFor(() => expect(screen.queryByRole('dialog')).not.toBeInTheDocument());
  });

  it('are an em dash when unknown', () => {
    renderPart(<Quantity value={null} unit="h" />);
    expect(screen.getByText('—')).toBeVisible();
    expect(screen.queryByText('h')).not.toBeInTheDocument();
  });

  it('a redshift stands beside its square, with its uncertainty', () => {
    const { container } = renderPart(<RedshiftValue redshift={7.1234} uncertainty={0.02} decimals={2} />);
    expect(container).toHaveTextContent('7.12± 0.02');
  });
});

it('the chain says what each section holds or lacks, and where one is', () => {
  renderPart(
    <SectionChain
      sections={[
        { label: 'Targets', to: '/p/targets', state: 'complete', detail: '5 targets' },
        { label: 'Case', to: '/p/case', state: 'lacking', detail: 'figure missing' },
      ]}
    />,
    '/p/case',
  );
  const here = screen.getByRole('link', { current: 'page' });
  expect(here).toHaveTextContent('Case, not complete');
  expect(here).toHaveTextContent('figure missing');
  expect(screen.getByRole('link', { name: /Targets, complete/ })).toHaveAttribute('href', '/p/targets');
});

it('cosmic time places targets and gives the numbers behind them', async () => {
  renderPart(
    <CosmicTimeStrip
      points={[
        { targetId: '1', name: 'CLR J0213−0417', redshift: 4.27, ageGyr: 1.424, hours: 3.1 },
        { targetId: '2', name: 'CLR J0216−0418', redshift: 10.31, ageGyr: 0.454, hours: null },
      ]}
      ticks={[
        { redshift: 0, ageGyr: 13.79 },
        { redshift: 6, ageGyr: 0.93 },
      ]}
      ageTicks={[{ redshift: 5.73, ageGyr: 1 }]}
      ageTodayGyr={13.79}
    />,
  );
  expect(screen.getByRole('img', { name: /2 targets along cosmic time, even in ln/ })).toBeVisible();
  await userEvent.click(screen.getByRole('button', { name: 'Numbers' }));
  expect(await screen.findByRole('row', { name: /CLR J0216−0418 10\.310 0\.4540 —/ })).toBeInTheDocument();
});

it('cosmic time is one stop of the tab key, walked with the arrows from the earliest light on', async () => {
  const onChoose = vi.fn();
  renderPart(
    <CosmicTimeStrip
      points={[
        { targetId: 'near', name: 'Near', redshift: 1, ageGyr: 5.85, hours: 2 },
        { targetId: 'far', name: 'Far', redshift: 8, ageGyr: 0.64, hours: 3.1 },
      ]}
      ticks={[]}
      ageTicks={[]}
      ageTodayGyr={13.79}
      onChoose={onChoose}
    />,
  );
  const far = screen.getByRole('button', { name: 'Far, z 8.000' });
  expect(far).toHaveAttribute('tabindex', '0');
  far.focus();
  expect(await screen.findByRole('tooltip')).toHaveTextContent('Far8.000 · 0.640 Gyr · 3.1 h');
  await userEvent.keyboard('{ArrowRight}{Enter}');
  expect(screen.getByRole('button', { name: 'Near, z 1.000' })).toHaveFocus();
  expect(onChoose).toHaveBeenCalledWith('near');
});

it('cosmic time counts very many targets in columns', () => {
  renderPart(
    <CosmicTimeStrip
      points={Array.from({ length: 600 }, (_, index) => ({
        targetId: String(index),
        name: `T${index}`,
        redshift: 1 + index / 300,
        ageGyr: 5 - index / 200,
        hours: null,
      }))}
      ticks={[]}
      ageTicks={[]}
      ageTodayGyr={13.79}
    />,
  );
  expect(
    screen.getByRole('img', { name: /600 targets along cosmic time, even in time: z 1\.00 to 3\.00/ }),
  ).toBeVisible();
  expect(screen.queryByRole('list')).not.toBeInTheDocument();
  expect(screen.getByText(/columns: number of targets/)).toBeInTheDocument();
});

it('a plot has a text alternative and its numbers behind it', async () => {
  renderPart(
    <PlotFrame
      title="Scale"
      description="Scale over redshift"
      x={{ label: 'redshift' }}
      y={{ label: 'scale', unit: 'kpc/″' }}
      series={[
        {
          kind: 'line',
          label: 'planck18',
          values: [
            { x: 1, y: 8.2 },
            { x: 2, y: null },
          ],
        },
      ]}
      fileName="scale.csv"
    />,
  );
  expect(screen.getByRole('img', { name: 'Scale over redshift' })).toBeVisible();
  await userEvent.click(screen.getByRole('button', { name: 'Numbers' }));
  expect(await screen.findByRole('row', { name: '2.000 —' })).toBeInTheDocument();
  expect(screen.getByRole('columnheader', { name: 'planck18 (kpc/″)' })).toBeInTheDocument();
});

describe('NumberField', () => {
  function Form({ onValid }: { onValid: (value: unknown) => void }) {
    const form = useZodForm(z.object({ z: z.number({ error: 'A redshift is a number.' }) }), {
      defaultValues: { z: 1.5 },
    });
    return (
      <form noValidate onSubmit={(event) => void form.handleSubmit(onValid)(event)}>
        <NumberField control={form.control} name="z" label="Redshift" unit="z" />
        <button type="submit">Go</button>
      </form>
    );
  }
  it('keeps text that is no number, says so beneath, and takes the focus there', async () => {
    const onValid = vi.fn();
    renderPart(<Form onValid={onValid} />);
    const field = screen.getByLabelText('Redshift');
    await userEvent.clear(field);
    await userEvent.type(field, 'abc');
    await userEvent.click(screen.getByRole('button', { name: 'Go' }));
    expect(await screen.findByText('A redshift is a number.')).toBeVisible();
    expect(field).toHaveValue('abc');
    await waitFor(() => expect(field).toHaveFocus());
    expect(onValid).not.toHaveBeenCalled();
  });
  it('takes a true minus and leaves trailing zeros while typing', async () => {
    const onValid = vi.fn();
    renderPart(<Form onValid={onValid} />);
    const field = screen.getByLabelText('Redshift');
    await userEvent.clear(field);
    await userEvent.type(field, '−2.50');
    expect(field).toHaveValue('−2.50');
    await userEvent.click(screen.getByRole('button', { name: 'Go' }));
    await waitFor(() => expect(onValid.mock.calls[0]?.[0]).toEqual({ z: -2.5 }));
  });
});

describe('useAutosave', () => {
  it('saves one value at a time and the last one last', async () => {
    const saved: string[] = [];
    let release: () => void = () => undefined;
    const save = (value: string) =>
      new Promise<void>((resolve) => {
        release = () => {
          saved.push(value);
          resolve();
        };
      });
    const { result } = renderHook(() => useAutosave<string>({ save, delayMs: 5 }));
    act(() => result.current.change('a'));
    await waitFor(() => expect(result.current.state.kind).toBe('saving'));
    act(() => result.current.change('b'));
    act(() => result.current.change('c'));
    await act(async () => release());
    await waitFor(() => expect(result.current.state.kind).toBe('saving'));
    await act(async () => release());
    await waitFor(() => expect(result.current.state.kind).toBe('saved'));
    expect(saved).toEqual(['a', 'c']);
    expect(result.current.hasUnsaved).toBe(false);
  });

  it('keeps a value that could not be saved and saves it when the connection returns', async () => {
    const save = vi
      .fn<(value: string) => Promise<void>>()
      .mockRejectedValueOnce(new ApiError({ code: 'unreachable', status: 0, message: 'No network.' }))
      .mockResolvedValue(undefined);
    const { result } = renderHook(() => useAutosave<string>({ save, delayMs: 5 }));
    act(() => result.current.change('typed'));
    await waitFor(() => expect(result.current.state.kind).toBe('failed'));
    expect(result.current.hasUnsaved).toBe(true);
    render(<SaveStatus state={result.current.state} />);
    expect(screen.getByRole('alert')).toHaveTextContent('not saved: offline');
    act(() => void window.dispatchEvent(new Event('online')));
    await waitFor(() => expect(result.current.state.kind).toBe('saved'));
    expect(save.mock.calls.map(([value]) => value)).toEqual(['typed', 'typed']);
  });
});
