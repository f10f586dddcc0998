'use client';

import { useRouter, useSearchParams } from 'next/navigation';
import { useDeferredValue, useState } from 'react';
import { typedNumber } from '@/components/batch/figures';
import { Box } from '@/components/ui/Box';
import { buttonClass, LinkButton } from '@/components/ui/Button';
import { Choice } from '@/components/ui/Choice';
import { Field, Select } from '@/components/ui/Field';
import { Haze } from '@/components/ui/Haze';
import { How } from '@/components/ui/How';
import { EmptyState, ErrorState } from '@/components/ui/Notice';
import { PageHead } from '@/components/ui/Page';
import { Sentence } from '@/components/ui/Sentence';
import { labelsPdfUrl, useLabelFacts, useLots } from '@/lib/client/lots';
import { useMe } from '@/lib/client/me';
import { STOCK_KEYS, STOCKS, type Design, type LabelFacts, type StockKey } from '@/lib/contracts/labels';
import type { LotSummary } from '@/lib/contracts/lots';
import { SheetPreview } from './SheetPreview';

const DESIGN_OPTIONS: readonly { value: Design; name: string }[] = [
  { value: 'log', name: 'the fall' },
  { value: 'plain', name: 'words' },
  { value: 'bands', name: 'level lines' },
];

/** Labels of one lot. The preview is the file that is printed. */
export function LabelsPage() {
  const { me, may } = useMe();
  const { lots, error, retry } = useLots({ limit: 200 });
  const asked = useSearchParams().get('lot');
  const router = useRouter();
  if (error && !lots) {
    return (
      <>
        <PageHead title="Labels" />
        <ErrorState title="The lots did not load" onRetry={retry}>
          {error.message}
        </ErrorState>
      </>
    );
  }
  if (!lots || !me) return <Haze height={420} label="Loading the labels" className="m-(--margin)" />;
  if (!may('labels.print')) {
    return (
      <>
        <PageHead title="Labels" />
        <EmptyState title="Labels are for brewers" action={<LinkButton href="/book">To the cellar book</LinkButton>}>
          Ask a keeper of {me.cellar.name} for the role of a brewer.
        </EmptyState>
      </>
    );
  }
  const lot = lots.find((one) => one.id === asked) ?? lots[0];
  if (!lot) {
    return (
      <>
        <PageHead title="Labels" />
        <EmptyState title="No lot to label" action={<LinkButton href="/bench">To the bench</LinkButton>}>
          A lot has labels from the day it is bottled.
        </EmptyState>
      </>
    );
  }
  return <Labels key={lot.id} lot={lot} lots={lots} onLot={(id) => router.replace(`/labels?lot=${id}`, { scroll: false })} />;
}

function Labels({ lot, lots, onLot }: { lot: LotSummary; lots: readonly LotSummary[]; onLot: (id: string) => void }) {
  const { label } = useLabelFacts(lot.id);
  const [stock, setStock] = useState<StockKey>('a4_cut');
  const [design, setDesign] = useState<Design>('log');
  const [name, setName] = useState('');
  const [under, setUnder] = useState('');
  const [count, setCount] = useState(String(Math.max(1, lot.counts.left)));
  const [start, setStart] = useState('1');
  const [numbered, setNumbered] = useState(true);
  const [colour, setColour] = useState(true);
  const [qr, setQr] = useState(true);
  const perSheet = STOCKS[stock].across * STOCKS[stock].down;
  const whole = (text: string, most: number) => {
    const value = typedNumber(text);
    return value !== null && Number.isInteger(value) && value >= 1 && value <= most ? value : null;
  };
  const [many, first] = [whole(count, 500), whole(start, perSheet)];
  const yes = (value: boolean) => (value ? 'yes' : 'no');
  const url = labelsPdfUrl(lot.id, {
    stock,
    design,
    count: many ?? 1,
    start: first ?? 1,
    numbered: yes(numbered),
    colour: yes(colour),
    qr: yes(qr),
    ...(name.trim() ? { name: name.trim() } : {}),
    ...(under.trim() ? { under: under.trim() } : {}),
  });
  const shown = useDeferredValue(url);
  return (
    <>
      <PageHead title="Labels" meta="What you see is the file that is printed. Print at 100 %.">
        <a href={url} download className={buttonClass('first', 'normal')}>
          Take the PDF
        </a>
      </PageHead>
      <div className="wide:grid wide:min-h-[calc(100dvh-var(--header)-62px)] wide:grid-cols-[412px_minmax(0,1fr)]">
        <div className="flex flex-col gap-3 bg-desk px-(--margin) py-4 wide:border-r-[1.5px] wide:border-ink">
          <Select label="lot" value={lot.id} onChange={(event) => onLot(event.target.value)}>
            {lots.map((one) => (
              <option key={one.id} value={one.id}>
                {one.name}, {one.code}
              </option>
            ))}
          </Select>
          <Choice label="design" value={design} options={DESIGN_OPTIONS} onChoose={setDesign} />
          <Select label="sheet" value={stock} onChange={(event) => setStock(event.target.value as StockKey)}>
            {STOCK_KEYS.map((key) => (
              <option key={key} value={key}>
                {STOCKS[key].name}
              </option>
            ))}
          </Select>
          <div className="grid grid-cols-2 gap-3">
            <Field label="how many" inputMode="numeric" value={count} error={many === null ? '1 to 500' : undefined} onChange={(event) => setCount(event.target.value)} />
            <Field label="first free place" inputMode="numeric" value={start} error={first === null ? `1 to ${perSheet}` : undefined} onChange={(event) => setStart(event.target.value)} />
          </div>
          <Field label="name" placeholder={label?.name ?? lot.name} maxLength={80} value={name} onChange={(event) => setName(event.target.value)} />
          <Field label="line below it" placeholder={label?.suggestion.style ?? label?.suggestion.name ?? ''} maxLength={60} value={under} onChange={(event) => setUnder(event.target.value)} />
          <Box ticked={numbered} onTick={setNumbered}>
            <span className="type-body">Number the bottles.</span>
          </Box>
          <Box ticked={colour} onTick={setColour}>
            <span className="type-body">In the drink’s colour; else black only.</span>
          </Box>
          <Box ticked={qr} onTick={setQr}>
            <span className="type-body">{label && !label.share ? 'Code to the share page: make a share link on the lot first.' : 'Code to the share page.'}</span>
          </Box>
          {label && <Facts label={label} />}
        </div>
        <div className="min-w-0 bg-well">
          <SheetPreview url={shown} title={`Labels of ${lot.name}, ${STOCKS[stock].name}`} />
        </div>
      </div>
    </>
  );
}

/** What the log has to say, each line with its rule. */
function Facts({ label }: { label: LabelFacts }) {
  const { suggestion } = label;
  return (
    <dl className="type-body border-t pt-2">
      <dt className="type-label text-ink2">may be called</dt>
      <dd>
        {suggestion.name}
        <How of="Name" how={{ formula: suggestion.rule, inputs: [], source: suggestion.source, status: suggestion.status as 'published' }} />
        <p className="type-reason text-ink2">
          <Sentence>{suggestion.law}</Sentence>
        </p>
      </dd>
      <dt className="type-label pt-2 text-ink2">strength</dt>
      <dd>
        <Sentence>{label.strength.text ?? 'not known'}</Sentence>
        <p className="type-reason text-ink2">
          <Sentence>{label.strength.note}</Sentence>
        </p>
        <How of="Strength on the label" how={label.strength.how} />
      </dd>
      <dt className="type-label pt-2 text-ink2">allergens and sulphite</dt>
      <dd>
        {label.allergens.text ?? 'none known'}
        {label.allergens.notes.map((note) => (
          <p key={note} className="type-reason text-ink2">
            <Sentence>{note}</Sentence>
          </p>
        ))}
        <How of="Allergens" how={label.allergens.how} />
      </dd>
    </dl>
  );
}
