'use client';

interface FilterTabsProps<T extends string> {
  label: string;
  value: T;
  onChoose: (value: T) => void;
  tabs: readonly { value: T; name: string; count?: number | undefined }[];
}

/** `Open 3 · In hand 2 · Cleared 41`: shows one part of a list. */
export function FilterTabs<T extends string>({ label, value, onChoose, tabs }: FilterTabsProps<T>) {
  return (
    <div role="group" aria-label={label} className="not-printed flex flex-wrap gap-2">
      {tabs.map((tab) => (
        <button
          key={tab.value}
          type="button"
          aria-pressed={tab.value === value}
          onClick={() => onChoose(tab.value)}
          className={`type-label min-h-11 rounded border px-3 strip:min-h-[30px] ${tab.value === value ? 'border-ink bg-ink text-on' : 'border-ink3 text-ink hover:bg-desk'}`}
          style={{ fontWeight: tab.value === value ? 600 : 500 }}
        >
          {tab.name}
          {tab.count !== undefined && ` ${tab.count}`}
        </button>
      ))}
    </div>
  );
}
