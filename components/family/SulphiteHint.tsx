import type { DrinkBody } from '@/lib/contracts/family';
import { MOLECULAR_TARGETS, sulphiteDose } from '@/lib/core/sulphite/dose';
import { Sentence } from '@/components/ui/Sentence';

/** At what temperature it is reckoned where nobody told one, °C: the published table begins there. */
const USUAL_C = 20;

/** How much would protect it, where its pH was measured. */
export function SulphiteHint({ drink, volumeL }: { drink: DrinkBody | undefined; volumeL: number }) {
  const pH = drink?.ph?.value;
  if (!drink || pH === undefined || pH < 2.5 || pH > 4.6) return 'Measure the pH, and Additions tells how much protects it.';
  const dose = sulphiteDose({
    pH,
    abvPercent: drink.strength?.balling.value.value ?? 0,
    celsius: drink.temperature_c ?? USUAL_C,
    volumeL,
    freeMgL: drink.free_sulphite_mg_l?.value ?? null,
    totalMgL: drink.total_sulphite_mg_l.hi,
    molecularTarget: MOLECULAR_TARGETS.usual,
    salt: 'potassium_metabisulphite',
  });
  return <Sentence>{dose.saltG.value > 0 ? `${dose.saltG.value} g by its pH ${pH.toFixed(2)}, for ${MOLECULAR_TARGETS.usual} mg/L molecular; how, and its cautions, under Additions.` : `None needed by its pH ${pH.toFixed(2)}.`}</Sentence>;
}
