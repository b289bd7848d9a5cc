import { describe, expect, it } from 'vitest';
import { sniffText } from '#src/bytes/sniff.ts';
import { sourceFromText } from '#src/bytes/source-from-text.ts';

const sniff = (text: string) => sniffText(sourceFromText('misleading.name', text));

describe('CIF', () => {
  it.each([
    ['a magic code', '#\\#CIF_2.0\ndata_a\n'],
    ['a data block', 'data_quartz\n_cell_length_a 4.9\n'],
    ['comments and blank lines first', '# remark\r\n\r\n   DATA_x\r\n'],
    ['other text first', 'printed on Monday\n\ndata_a\nloop_\n_atom_site_label\nSi1\n'],
    ['no data block at all', 'loop_\n_atom_site_label\n_atom_site_fract_x\nSi1 0.1\n'],
    ['CR line endings', 'hello\rdata_a\r_cell_length_a 4.9\r'],
  ])('is told by %s', (_name, text) => {
    expect(sniff(text)).toMatchObject({ format: 'cif', hint: null });
  });

  it('needs more than a word that starts with data_ somewhere', () => {
    expect(sniff('a log\ndata_type is real\nend\n').format).toBe('unknown');
  });
});

describe('XYZ', () => {
  it.each([
    ['plain rows', '2\nwater?\nO 0 0 0\nH 0 0 1\n'],
    ['blank lines first', '\n\n 1 \n\nO 0 0 0'],
    ['atomic numbers', '1\n\n8 0.0 -1.5D0 2e-3\n'],
    ['Properties with another first column', '1\nProperties=pos:R:3:species:S:1\n0 0 0 O\n'],
    ['a data_ word in the comment', '1\ndata_quartz\nO 0 0 0\n'],
    ['a count with a remark', '1 atom\n\nO 0 0 0\n'],
    ['a cut after the count', '9\n'],
  ])('is told by %s', (_name, text) => {
    expect(sniff(text)).toMatchObject({ format: 'xyz', hint: null });
  });

  it('is not a table of numbers', () => {
    expect(sniff('3\n1.0 2.0\n2.0 3.0\n3.0 4.0\n').format).toBe('unknown');
    expect(sniff('14 0 0 0\n8 0 0 1\n8 0 1 0\n').format).toBe('unknown');
  });
});

describe('other texts', () => {
  it.each([
    ['HTML', '\n<!DOCTYPE html><html>', /web page/],
    ['SVG', '<?xml version="1.0"?>\n<svg xmlns="x">', /SVG/],
    ['XML', '<?xml version="1.0"?><cml/>', /XML/],
    ['JSON', '{"schema": "x"}', /JSON/],
    ['a JSON list', '[1, 2]', /JSON/],
    ['PDF', '%PDF-1.7', /PDF/],
    ['a picture', '‰PNG\r\n', /neither|picture/],
    ['a spectrum', '##TITLE= x\n##JCAMP-DX= 5.01\n', /spectrum/],
    ['nothing', ' \n\t', /empty/],
    ['a letter', 'Dear colleague,\n', /neither a data block nor a number of atoms/],
  ])('%s is named, with a way on', (_name, text, reason) => {
    const found = sniff(text);
    expect(found.format).toBe('unknown');
    expect(found.reason).toMatch(reason);
    expect(found.hint).toMatch(/\w{3}/);
  });
});
