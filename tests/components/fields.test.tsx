import { renderToStaticMarkup } from 'react-dom/server';
import { describe, expect, it } from 'vitest';
import { Button } from '@/components/ui/button';
import { Checkbox } from '@/components/ui/checkbox';
import { DateField } from '@/components/ui/date-field';
import { NumberField } from '@/components/ui/number-field';
import { SelectField } from '@/components/ui/select-field';
import { TextField } from '@/components/ui/text-field';
import { TextareaField } from '@/components/ui/textarea-field';

const fields = [
  ['text', <TextField key="a" id="f" label="Name" hint="As printed" error="Say who" />],
  [
    'number',
    <NumberField key="b" id="f" label="Rate" unit="a month" hint="As planned" error="A rate is above zero." />,
  ],
  [
    'date',
    <DateField key="c" id="f" label="Day" hint="As planned" error="Too late" value="2027-03-14" onChange={() => {}} />,
  ],
  ['textarea', <TextareaField key="d" id="f" label="Reason" hint="Kept for good" error="Say why" />],
  [
    'select',
    <SelectField key="e" id="f" label="Kind" hint="One" error="Choose one" options={[{ value: 'a', label: 'A' }]} />,
  ],
  ['checkbox', <Checkbox key="g" id="f" label="Move" hint="Both months" error="Tick it" />],
] as const;

describe.each(fields)('the %s field', (_name, element) => {
  const html = renderToStaticMarkup(element);

  it('is labelled, and ties its error and its hint to the control', () => {
    expect(html).toContain('for="f"');
    expect(html).toMatch(/<(input|textarea|select)[^>]* id="f"/);
    expect(html).toContain('aria-describedby="f-error f-hint"');
    expect(html).toContain('id="f-error"');
    expect(html).toContain('id="f-hint"');
    expect(html).toContain('aria-invalid="true"');
  });
});

it('claims nothing wrong where nothing is', () => {
  const html = renderToStaticMarkup(<TextField label="Name" />);
  expect(html).not.toContain('aria-invalid="');
  expect(html).not.toContain('aria-describedby');
});

it('prints the date field’s ISO value as a day', () => {
  expect(renderToStaticMarkup(<DateField label="Day" value="2027-03-14" onChange={() => {}} />)).toContain(
    'value="14 Mar 2027"',
  );
});

it('asks back a date that reads two ways', () => {
  const html = renderToStaticMarkup(<DateField label="Day" value="03/04/27" onChange={() => {}} />);
  expect(html).toContain('3 Apr 2027');
  expect(html).toContain('4 Mar 2027');
});

it('keeps a working button in the tab order', () => {
  const html = renderToStaticMarkup(
    <Button pending pendingLabel="Publishing 2 of 6">
      Publish to sponsor
    </Button>,
  );
  expect(html).toContain('aria-disabled="true"');
  expect(html).not.toContain(' disabled=""');
  expect(html).toContain('Publishing 2 of 6');
});
