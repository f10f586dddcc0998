/** What is still on its way: lines growing denser downwards. Nothing moves. */
export function Haze({ height = 64, label = 'Loading', className = '' }: { height?: number; label?: string; className?: string }) {
  const lines: { y: number; opacity: number }[] = [];
  for (let y = 0.5, index = 0; y < height; index++) {
    lines.push({ y: Math.round(y) + 0.5, opacity: 0.25 + 0.5 * (y / height) });
    y += Math.max(3, 10 - index);
  }
  return (
    <div role="status" aria-label={label} className={`overflow-hidden text-rule2 ${className}`} style={{ height }}>
      <svg width="100%" height={height} aria-hidden>
        {lines.map((line) => (
          <line key={line.y} x1="0" x2="100%" y1={line.y} y2={line.y} stroke="currentColor" strokeOpacity={line.opacity} />
        ))}
      </svg>
    </div>
  );
}
