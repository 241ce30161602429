'use client';

import { useRouter } from 'next/navigation';
import { useRef, useState } from 'react';
import { Chosen, Typing } from '@/components/readings/boxes';
import { sayJudgement } from '@/components/readings/ribbon';
import type { Cutting } from '@/lib/domain/operations/operation';
import { comparatorSize, type ComparatorSide, judge } from '@/lib/domain/readings/judge';
import type { Length, LengthUnit } from '@/lib/domain/quantity/length';
import { LENGTH_PROBLEM_WORDS, parseLength } from '@/lib/domain/quantity/parse-length';
import { parseTemperature, TEMPERATURE_PROBLEM_WORDS } from '@/lib/domain/quantity/temperature';
import { printNear } from '@/lib/domain/quantity/print-length';

interface EntryProps {
  orderId: string;
  lineId: string;
  unit: LengthUnit;
  /** Features with their limits, in order. */
  features: readonly { feature: string; what: string; cutting: Cutting; lower: Length; upper: Length }[];
  positions: readonly string[];
  stages: readonly { value: 'found' | 'cut' | 'finished'; label: string }[];
}

const SIDES: readonly { value: ComparatorSide; label: string }[] = [
  { value: 'smaller', label: 'Smaller than set' },
  { value: 'on', label: 'On zero' },
  { value: 'bigger', label: 'Bigger than set' },
];

interface Typed {
  readonly text: string;
  /** Never chosen beforehand: a side that nobody pressed would be a guess. */
  readonly side: ComparatorSide | null;
}

/** What the gauge reads on its setting standard once the round is done. */
const AFTERWARDS = [
  { value: '', label: 'Not looked at' },
  { value: 'on', label: 'On zero' },
  { value: 'smaller', label: 'Smaller, by' },
  { value: 'bigger', label: 'Bigger, by' },
] as const;

/** Readings of one line, position by position, as sizes or from a comparator in words. Nothing typed is lost when sending fails. */
export function ReadingsEntry({ orderId, lineId, unit, features, positions, stages }: EntryProps) {
  const router = useRouter();
  const [how, setHow] = useState<'size' | 'comparator'>('size');
  const [setTo, setSetTo] = useState('');
  const [stage, setStage] = useState(stages[0]?.value ?? 'cut');
  const [instrument, setInstrument] = useState('');
  const [feature, setFeature] = useState(features[0]?.feature ?? '');
  const [typed, setTyped] = useState<Readonly<Record<string, Typed>>>({});
  const [temperature, setTemperature] = useState('');
  const [after, setAfter] = useState<{ side: string; text: string }>({ side: '', text: '' });
  const [said, setSaid] = useState('');
  // Each reading keeps its id until the server has it: sent twice, it stands once.
  const ids = useRef(new Map<string, string>());
  const limits = features.find((one) => one.feature === feature);
  const setting = parseLength(setTo, unit);

  const read = (position: string): Length | null => {
    const one = typed[position];
    if (!one) return null;
    if (how === 'size') {
      const size = parseLength(one.text, unit);
      return size.ok ? size.value : null;
    }
    if (one.side === null) return null;
    const away = one.side === 'on' ? parseLength('0', unit) : parseLength(one.text, unit);
    return setting.ok && away.ok && away.value >= 0
      ? comparatorSize(setting.value, away.value, one.side)
      : null;
  };

  const isOpen = (position: string) => (typed[position]?.text ?? '') !== '' || typed[position]?.side === 'on';
  const filled = positions.filter(isOpen);

  const send = async () => {
    setSaid('Sending …');
    const readings = filled.map((position) => ({
      ...{
        id: idOf(ids.current, position),
        lineId,
        feature,
        position,
        unit,
        stage,
        instrument,
        temperature,
        takenAt: new Date().toISOString(),
      },
      text: typed[position]?.text === '' ? '0' : (typed[position]?.text ?? ''),
      setToText: how === 'comparator' ? setTo : null,
      side: how === 'comparator' ? (typed[position]?.side ?? 'on') : null,
    }));
    try {
      const response = await fetch(`/api/v1/orders/${orderId}/readings`, {
        method: 'POST',
        headers: { 'content-type': 'application/json', 'idempotency-key': crypto.randomUUID() },
        body: JSON.stringify({
          readings,
          afterwards: how === 'comparator' && after.side !== '' ? after : null,
        }),
      });
      if (!response.ok) {
        setSaid(sayProblem((await response.json()) as Problem));
        return;
      }
      setTyped({});
      ids.current.clear();
      // The next round is looked at anew.
      setAfter({ side: '', text: '' });
      const next = features[features.findIndex((one) => one.feature === feature) + 1];
      setSaid(`${limits?.what ?? ''} ${feature}: ${readings.length} readings are kept.`);
      if (next) setFeature(next.feature);
      router.refresh();
    } catch {
      setSaid('Not sent: no connection. What you typed is still here; send again.');
    }
  };

  return (
    <section className="mt-5 border-t border-rule pt-4" aria-label="Enter readings">
      <h3 className="mb-3">Enter readings</h3>
      <div className="grid gap-3 sm:grid-cols-2">
        <Chosen
          label="Entered"
          value={how}
          set={(value) => setHow(value === 'size' ? 'size' : 'comparator')}
          options={HOW}
        />
        <Chosen
          label="Stage"
          value={stage}
          set={(value) => setStage(stages.find((one) => one.value === value)?.value ?? 'cut')}
          options={stages}
        />
        {how === 'comparator' && (
          <Typing
            label="Gauge set to"
            value={setTo}
            set={setSetTo}
            wrong={setTo !== '' && !setting.ok ? LENGTH_PROBLEM_WORDS[setting.problem] : ''}
          />
        )}
        <Typing label="Instrument" value={instrument} set={setInstrument} wrong="" words />
        <Typing
          label="Temperature of the part"
          value={temperature}
          set={setTemperature}
          wrong={wrongTemperature(temperature, unit)}
          words
          hint={unit === 'in' ? 'As 68 F, where it was taken' : 'As 20 C, where it was taken'}
        />
        <Chosen
          label="Which"
          value={feature}
          set={setFeature}
          options={features.map((one) => ({ value: one.feature, label: `${one.what} ${one.feature}` }))}
        />
      </div>
      <ol className="mt-3">
        {positions.map((position) => {
          const one = typed[position] ?? { text: '', side: null };
          const size = read(position);
          const change = (more: Partial<Typed>) =>
            setTyped((before) => ({ ...before, [position]: { ...one, ...more } }));
          return (
            <li key={position} className="border-b border-rule-2 py-3">
              <div className="flex flex-wrap items-end gap-3">
                {how === 'comparator' && (
                  <fieldset className="grid grow grid-cols-3 gap-2">
                    <legend className="sr-only">{position}: which side of zero</legend>
                    {SIDES.map(({ value, label }) => (
                      <button
                        key={value}
                        type="button"
                        aria-pressed={one.side === value}
                        onClick={() => change({ side: value })}
                        className="min-h-12 rounded border-2 border-rule bg-paper px-1 text-[15px] leading-tight aria-pressed:border-blue aria-pressed:bg-blue-wash aria-pressed:font-semibold"
                      >
                        {label}
                      </button>
                    ))}
                  </fieldset>
                )}
                <Typing
                  label={position}
                  value={one.text}
                  set={(text) => change({ text })}
                  wrong={wrongOf(one.text, unit)}
                />
              </div>
              {size !== null && isOpen(position) && limits && (
                <p className="mt-1">
                  so it is <b className="num">{printNear(size, unit)}</b>,{' '}
                  {sayJudgement(judge([size], limits), unit)}
                </p>
              )}
            </li>
          );
        })}
      </ol>
      {how === 'comparator' && (
        <div className="mt-3 grid gap-3 sm:grid-cols-2">
          <Chosen
            label="The gauge afterwards, on what it was set to"
            value={after.side}
            set={(side) => setAfter((before) => ({ ...before, side }))}
            options={AFTERWARDS}
          />
          {(after.side === 'smaller' || after.side === 'bigger') && (
            <Typing
              label="By how much"
              value={after.text}
              set={(text) => setAfter((before) => ({ ...before, text }))}
              wrong={wrongOf(after.text, unit)}
            />
          )}
        </div>
      )}
      <p className="my-3 min-h-6 font-semibold" role="status">
        {said}
      </p>
      <button
        type="button"
        className="btn"
        disabled={filled.length === 0 || filled.some((position) => read(position) === null)}
        onClick={() => void send()}
      >
        Keep {filled.length} readings
      </button>
    </section>
  );
}

const HOW = [
  { value: 'size', label: 'As sizes' },
  { value: 'comparator', label: 'From a comparator, in words' },
] as const;

function wrongOf(text: string, unit: LengthUnit): string {
  if (text === '') return '';
  const parsed = parseLength(text, unit);
  return parsed.ok ? '' : LENGTH_PROBLEM_WORDS[parsed.problem];
}

function wrongTemperature(text: string, unit: LengthUnit): string {
  if (text.trim() === '') return '';
  const parsed = parseTemperature(text, unit === 'in' ? 'F' : 'C');
  return parsed.ok ? '' : TEMPERATURE_PROBLEM_WORDS[parsed.problem];
}

function idOf(ids: Map<string, string>, position: string): string {
  const known = ids.get(position) ?? crypto.randomUUID();
  ids.set(position, known);
  return known;
}

interface Problem {
  readonly title: string;
  readonly errors?: readonly { readonly detail: string }[];
}

function sayProblem({ title, errors }: Problem): string {
  return errors?.[0] ? `${title} ${errors[0].detail}` : title;
}
