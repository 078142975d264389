/** Lines whose place is known: lamps in air wavelengths, and standards of Raman shift. */

export type LampName = 'neon' | 'argon' | 'mercury' | 'krypton';
export type ShiftStandardName = 'silicon' | 'polystyrene' | 'cyclohexane';

/**
 * Wavelengths in standard air, nm.
 *
 * Neon, and argon's 696.5431 to 912.2967 with four digits: NIST Atomic Spectra Database; neon as in
 * E. B. Saloman and C. J. Sansonetti, J. Phys. Chem. Ref. Data 33, 1113 (2004). Argon's with three digits,
 * mercury and krypton: the same database, from memory.
 */
export const lampLinesNm: Readonly<Record<LampName, readonly number[]>> = {
  neon: [
    585.24879, 588.1895, 594.48342, 603.0, 607.43377, 609.61631, 614.30626, 616.35939, 621.72812,
    626.6495, 630.4789, 633.44278, 638.29917, 640.2248, 650.65281, 653.28822, 659.89529, 667.82762,
    671.7043, 692.94673, 702.40504, 703.24131, 717.39381, 724.51666, 743.8899,
  ],
  argon: [
    696.5431, 706.722, 738.398, 750.387, 763.5106, 772.376, 794.8176, 800.616, 811.5311, 826.4522,
    842.4648, 912.2967,
  ],
  mercury: [546.074, 576.96, 579.066],
  krypton: [557.029, 587.091, 760.155, 769.454, 785.482, 811.29, 877.675],
};

/**
 * Raman shifts, cm⁻¹.
 *
 * Polystyrene and cyclohexane: ASTM E1840, digits from memory; an independent polystyrene disc agrees
 * within 1.2 cm⁻¹ (S. Itoh and N. Hanari, Anal. Sci. 37, 1533 (2021)). Silicon: its first-order line, 520.5 to
 * 520.7 at room temperature, from memory.
 */
export const shiftLinesCm1: Readonly<Record<ShiftStandardName, readonly number[]>> = {
  silicon: [520.6],
  polystyrene: [
    620.9, 795.8, 1001.4, 1031.8, 1155.3, 1450.5, 1583.1, 1602.3, 2852.4, 2904.5, 3054.3,
  ],
  cyclohexane: [
    384.1, 426.3, 801.3, 1028.3, 1157.6, 1266.4, 1444.4, 2664.4, 2852.9, 2923.8, 2938.3,
  ],
};
