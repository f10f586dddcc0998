import { splitFigures } from '@/lib/core/units/figures';
import { figureRead } from './units';

/** A sentence in prose with its figures typed in, in the units that the person reads. `strong` inside a verdict. */
export function Sentence({ children, strong = false }: { children: string; strong?: boolean }) {
  return (
    <>
      {splitFigures(children).map((piece, index, pieces) =>
        piece.figure ? (
          <span key={index} className={strong ? 'fig-strong' : 'fig'}>
            {figureRead(piece.text.replace(/^-/, '−'), pieces[index - 1]?.text)}
          </span>
        ) : (
          piece.text
        ),
      )}
    </>
  );
}
