import type { ReactNode } from 'react';

/** Drawn for Fallbright: one stroke, no fills. A word always stands beside one. */
function Icon({ children, size = 20, className = '' }: { children: ReactNode; size?: number; className?: string }) {
  return (
    <svg viewBox="0 0 20 20" width={size} height={size} aria-hidden fill="none" stroke="currentColor" strokeWidth="1.6" strokeLinejoin="round" className={`shrink-0 ${className}`}>
      {children}
    </svg>
  );
}

interface IconProps {
  size?: number;
  className?: string;
}

export const ShelfIcon = (props: IconProps) => (
  <Icon {...props}>
    <path d="M1 17.5h18M4.2 3.5v3.4C2.9 7.7 2 8.9 2 10.6v6.9h6v-6.9c0-1.7-.9-2.9-2.2-3.7V3.5ZM14.2 3.5v3.4c-1.3.8-2.2 2-2.2 3.7v6.9h6v-6.9c0-1.7-.9-2.9-2.2-3.7V3.5Z" />
  </Icon>
);

export const RoundsIcon = (props: IconProps) => (
  <Icon {...props}>
    <path d="M2.5 2.5h6v6h-6ZM2.5 11.5h6v6h-6ZM11.5 5.5h6M11.5 14.5h6M4 5.4l1.2 1.2 2.2-2.6" />
  </Icon>
);

export const SheetIcon = (props: IconProps) => (
  <Icon {...props}>
    <path d="M4 1.8h8.6L16 5.2v13H4ZM7 7.5h6M7 11h6M7 14.5h3.6" />
  </Icon>
);

export const CompareIcon = (props: IconProps) => (
  <Icon {...props}>
    <path d="M2 2v16h16M4.5 4c2 0 3 9.5 13 9.5M4.5 8c3 0 4 7.5 13 7.5" />
  </Icon>
);

export const FlagIcon = (props: IconProps) => (
  <Icon {...props}>
    <path d="M3 1.5v17M3 2.4l14 5L3 12.4" />
  </Icon>
);

export const FloatIcon = (props: IconProps) => (
  <Icon {...props}>
    <path d="M1.5 13.5c1.4-1.2 2.9-1.2 4.3 0s2.8 1.2 4.2 0 2.8-1.2 4.2 0 2.9 1.2 4.3 0" />
    <path d="m8 14 2.7-10.4a1.7 1.7 0 0 1 3.3.9L11.4 14" />
    <path d="M3 17.8h14" />
  </Icon>
);

export const LinesIcon = (props: IconProps) => (
  <Icon {...props}>
    <path d="M2.5 4.5h15M2.5 10h15M2.5 15.5h15" />
  </Icon>
);

export const BackIcon = (props: IconProps) => (
  <Icon {...props}>
    <path d="m12.5 3-7 7 7 7" />
  </Icon>
);

export const OnwardIcon = (props: IconProps) => (
  <Icon {...props}>
    <path d="m7.5 3 7 7-7 7" />
  </Icon>
);

export const DayNightIcon = ({ night, ...props }: IconProps & { night: boolean }) => (
  <svg viewBox="0 0 28 14" width="24" height="12" aria-hidden fill="none" stroke="currentColor" strokeWidth="1.5" className={props.className}>
    <circle cx="7" cy="7" r="5.2" fill={night ? 'none' : 'currentColor'} />
    <path d="M25 2.2A5.6 5.6 0 1 0 25 11.8 6.4 6.4 0 0 1 25 2.2Z" fill={night ? 'currentColor' : 'none'} strokeLinejoin="round" />
  </svg>
);

export const BottleIcon = (props: IconProps) => (
  <Icon {...props}>
    <path d="M8.2 1.5h3.6v5c0 1.5 2.2 2.3 2.2 4.5v6.5c0 .6-.4 1-1 1H7c-.6 0-1-.4-1-1V11c0-2.2 2.2-3 2.2-4.5ZM6 12h8" />
  </Icon>
);

export const LabelIcon = (props: IconProps) => (
  <Icon {...props}>
    <path d="M1.5 4.5h17v11h-17ZM1.5 6.5c5 1 6 6 17 6" />
  </Icon>
);

export const BookIcon = (props: IconProps) => (
  <Icon {...props}>
    <path d="M3.5 2.5h13v15h-13ZM6.5 2.5v15M9.5 6.5h4M9.5 9.5h4" />
  </Icon>
);
