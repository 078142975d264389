/** Text with one spectrum in columns, and values at points. */
import { describe, expect, it } from 'vitest';
import { entryOf, numbersOf, openText, shapesOf } from './open-text';

describe('one spectrum', () => {
  it('has an array for each column, named by its heading', async () => {
    const file = await openText(['wavelength_nm,counts', '600.5,7', '601,300', '601.5,2']);
    expect(shapesOf(file)).toEqual(['wavelength_nm 3 float64', 'counts 3 uint16']);
    expect(await numbersOf(file, 'wavelength_nm')).toEqual([600.5, 601, 601.5]);
    expect([...(await file.read('counts', [1], [2]))]).toEqual([300, 2]);
  });

  it.each([
    ['wavelength_nm', 'nm'],
    ['Wavelength (nm)', 'nm'],
    ['Energy [eV]', 'eV'],
    ['raman_shift_cm1', 'cm-1'],
    ['Raman shift / cm-1', 'cm-1'],
    ['E/eV', 'eV'],
    ['Intensity (a.u.)', 'a.u.'],
    ['counts/s', 's'],
    ['Wavelength', undefined],
  ])('has the unit of the heading %s', async (heading, units) => {
    const file = await openText([`${heading};value`, '1;2', '3;4']);
    expect(entryOf(file, heading).attributes.units).toBe(units);
  });

  it('has names without a header too', async () => {
    const file = await openText(['600.5 7', '601 300'], 'spectrum.txt');
    expect(shapesOf(file)).toEqual(['column 1 2 float64', 'column 2 2 uint16']);
    const one = await openText(['600.5', '601', '601.5'], 'axis.txt');
    expect(shapesOf(one)).toEqual([' 3 float64']);
    const named = await openText(['wavelength_nm', '600', '601'], 'axis.csv');
    expect(shapesOf(named)).toEqual(['wavelength_nm 2 uint16']);
  });

  it('tells columns of one name apart', async () => {
    const file = await openText(['nm,counts,counts', '1,2,3', '4,5,6']);
    expect(file.entries.map(({ path }) => path)).toEqual(['nm', 'counts', 'counts 2']);
    expect(await numbersOf(file, 'counts 2')).toEqual([3, 6]);
  });

  it('keeps rows whose axis cell is empty', async () => {
    const file = await openText(['pixel,wavelength_nm,counts', '0,600.5,1', '1,,2', '2,,3']);
    expect(await numbersOf(file, 'wavelength_nm')).toEqual([600.5, Number.NaN, Number.NaN]);
    expect(shapesOf(file)).toEqual(['pixel 3 uint8', 'wavelength_nm 3 float64', 'counts 3 uint8']);
  });

  it('may call its columns x and y', async () => {
    expect(shapesOf(await openText(['x,y', '1,5', '2,4']))).toEqual(['x 2 uint8', 'y 2 uint8']);
    const file = await openText(['x,y,error', '1,5,0.1', '2,4,0.2', '3,9,0.1']);
    expect(shapesOf(file)).toEqual(['x 3 uint8', 'y 3 uint8', 'error 3 float64']);
    expect(file.notes).toEqual([]);
    const wide = await openText(['x,y,error,fit', '1,5,0.1,5', '2,4,0.2,4', '3,9,0.1,9']);
    expect(shapesOf(wide)).toHaveLength(4);
    expect(wide.notes).toEqual([]);
  });

  it('may have several spectra over one axis', async () => {
    const file = await openText(['wavelength_nm\trun 1\trun 2', '600\t1\t2', '601\t3\t4'], 'a.tsv');
    expect(file.entries.map(({ path }) => path)).toEqual(['wavelength_nm', 'run 1', 'run 2']);
  });
});

describe('values at points', () => {
  it('are maps where the points form a grid', async () => {
    const file = await openText(['x_um,y_um,height_nm', '0,0,1.5', '1,0,2.5', '0,1,3', '1,1,4.25']);
    expect(shapesOf(file)).toEqual(['height_nm 2 × 2 float64', 'x 2 uint8', 'y 2 uint8']);
    expect(await numbersOf(file, 'height_nm')).toEqual([1.5, 2.5, 3, 4.25]);
  });

  it('stay a list where they are scattered', async () => {
    const file = await openText(['x,y,height,phase', '5,1,1,9', '2,7,2,8', '4,3,3,7']);
    expect(shapesOf(file)).toEqual(['height 3 uint8', 'phase 3 uint8', 'x 3 uint8', 'y 3 uint8']);
    expect(file.notes[0]).toContain('scattered');
  });
});
