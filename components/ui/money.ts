import { useMe } from '@/lib/client/me';

type Money = (amount: number) => string;

/** `12.50`, `12.50 EUR` as its symbol writes it, in the place where English puts it. */
export const moneyText = (amount: number, currency: string | null): string =>
  currency === null ? amount.toFixed(2) : new Intl.NumberFormat('en-GB', { style: 'currency', currency, currencyDisplay: 'narrowSymbol' }).format(amount).replace('-', '−');

/** Costs in what the cellar counts in; figures alone where it never said. */
export function useMoney(): { money: Money; /** For the unit of a field; empty where none was told. */ currency: string } {
  const currency = useMe().me?.cellar.currency ?? null;
  return { money: (amount) => moneyText(amount, currency), currency: currency ?? '' };
}
