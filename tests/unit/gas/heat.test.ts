import { describe, expect, it } from 'vitest';
import { selfHeatingC } from '../../../lib/core/gas/heat';

describe('the heat of its own work', () => {
  it('is 0.31 °C a point, for the hours the vessel holds it', () => {
    // 20 L: 4 h + 0.6 h/L = 16 h; 24 points a day are one an hour.
    expect(selfHeatingC(20, 24)).toBeCloseTo(0.31 * 16, 12);
  });

  it('follows from 100 kJ a mol of hexose (Williams 1982), 180.16 g/mol, the sugar of a point and 4.18 kJ/(kg K)', () => {
    // 1.01 g/L of CO2 a point (Balling's split); 2 mol of CO2, 88.02 g, from one of hexose.
    const perPoint = ((1.01 / 88.02) * 100) / 4.18;
    expect(selfHeatingC(20, 24) / 16 / perPoint).toBeGreaterThan(0.95);
    expect(selfHeatingC(20, 24) / 16 / perPoint).toBeLessThan(1.15);
  });

  it('is more in a larger vessel, and nothing where nothing falls', () => {
    expect(selfHeatingC(25, 10)).toBeGreaterThan(selfHeatingC(5, 10));
    expect(selfHeatingC(20, 0)).toBe(0);
    expect(selfHeatingC(20, -3)).toBe(0);
  });
});
