/** The mark: haze settling in a vessel, clear above. At 20 px or less two level lines are enough. */
export function Mark({ size = 28, className = '' }: { size?: number; className?: string }) {
  const small = size <= 20;
  return (
    <svg viewBox="0 0 32 32" width={size} height={size} aria-hidden fill="none" stroke="currentColor" strokeWidth="2" className={className}>
      <path d="M12 2h8 M13 2v6.2C7 9.6 4 13.6 4 18.4V27c0 1.7 1.3 3 3 3h18c1.7 0 3-1.3 3-3v-8.6c0-4.8-3-8.8-9-10.2V2" />
      {small ? <path d="M5 18h22 M5 24h22" /> : <path d="M5 17.5h22 M5 22h22 M5 25.2h22 M5 27.6h22" strokeWidth="1.7" />}
    </svg>
  );
}

/** Mark and word, the gap 0.4 of the mark's height. */
export function Wordmark({ size = 24 }: { size?: number }) {
  return (
    <span className="inline-flex items-center" style={{ gap: size * 0.4 }}>
      <Mark size={size} />
      <span className="font-serif leading-none" style={{ fontSize: `min(${(size * 0.8) / 16}rem, ${size}px)`, fontWeight: 760, letterSpacing: '-0.005em' }}>
        Fallbright
      </span>
    </span>
  );
}
