/** The key: one line of text with the marks as they are drawn. */
export function ChartKey() {
  const ink = { stroke: 'var(--ink)', fill: 'none' };
  return (
    <p aria-hidden="true" className="type-label flex flex-wrap items-center gap-x-[18px] gap-y-1 text-ink2">
      <span className="font-bold text-ink">Gravity</span>
      <span className="inline-flex items-center gap-2">
        <svg width="26" height="10">
          <path d="M0 5h26" strokeWidth="2.2" {...ink} />
        </svg>
        fit
      </span>
      <span className="inline-flex items-center gap-2">
        <svg width="26" height="10" fill="var(--ink)">
          <circle cx="3" cy="6" r="1.5" />
          <circle cx="10" cy="4" r="1.5" />
          <circle cx="17" cy="6" r="1.5" />
          <circle cx="24" cy="4" r="1.5" />
        </svg>
        sensor
      </span>
      <span className="inline-flex items-center gap-2">
        <svg width="20" height="12">
          <path d="M0 6h20" strokeWidth="1.3" {...ink} />
          <circle cx="10" cy="6" r="4.6" strokeWidth="1.6" stroke="var(--ink)" fill="var(--lit)" />
        </svg>
        hydrometer
      </span>
      <span className="inline-flex items-center gap-2">
        <svg width="26" height="12">
          <path d="M0 .5h26M0 3.5h26M0 9.5h26M0 11.5h26" strokeWidth="1" stroke="var(--ink)" strokeOpacity="0.3" />
          <path d="M0 6h26" strokeWidth="1.6" strokeDasharray="5 3" {...ink} />
        </svg>
        forecast, 8 in 10
      </span>
    </p>
  );
}
