import { splitFigures } from './figures';

/** A sentence in prose with its figures typed in. `strong` inside a verdict. */
export function Sentence({ children, strong = false }: { children: string; strong?: boolean }) {
  return (
    <>
      {splitFigures(children).map((piece, index) =>
        piece.figure ? (
          <span key={index} className={strong ? 'fig-strong' : 'fig'}>
            {piece.text.replace(/^-/, '−')}
          </span>
        ) : (
          piece.text
        ),
      )}
    </>
  );
}
