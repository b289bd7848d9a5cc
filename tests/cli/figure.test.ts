import { describe, expect, it } from 'vitest';
import { runCommand } from '#tests/support/command-io.ts';
import { decodePng, textChunk } from '#tests/support/decode-png.ts';

/** Cell and positions of α-quartz: Levien, Prewitt & Weidner, Am. Mineral. 65, 920 (1980); tensors invented. */
const quartz = `3
Lattice="4.916 0 0 -2.458 4.2574 0 0 0 5.4054" Properties=species:S:1:pos:R:3:shielding:R:9:efg:R:9 site:S:1
Si 2.30905 0 3.6036 440 3 1 3 430 2 1 2 410 0.1 0.02 0 0.02 0.2 0 0 0 -0.3
Si -1.1545 1.9997 1.8018 440 3 1 3 430 2 1 2 410 0.1 0.02 0 0.02 0.2 0 0 0 -0.3
O 1.3767 1.1363 4.2474 240 9 4 9 200 7 4 7 180 0.5 0.1 0 0.1 0.2 0 0 0 -0.7
`;
const water = `3
a molecule without a cell
O 0 0 0
H 0.9572 0 0
H -0.2400 0.9266 0
`;
const files = { 'quartz.xyz': quartz, 'water.xyz': water };
const small = ['--width-px', '200', '--height-px', '160', '--text-pt', '8'];

const figure = (...words: string[]) => runCommand(['figure', ...words], files);

describe('ellipsite figure', () => {
  it('writes a picture of the size asked for, in mm at dpi', async () => {
    const { status, written, out } = await figure(
      'quartz.xyz',
      '-o',
      'q.png',
      '--width-mm',
      '40',
      '--height-mm',
      '60',
      '--dpi',
      '150',
    );
    expect(status).toBe(0);
    expect(out).toBe('');
    const png = decodePng(written['q.png']!);
    // 40 / 25.4 × 150 = 236.2; 60 / 25.4 × 150 = 354.3
    expect([png.width, png.height]).toEqual([236, 354]);
    const physical = png.chunks.find(({ type }) => type === 'pHYs')!.data;
    // 150 / 0.0254 = 5905.5
    expect(new DataView(physical.buffer, physical.byteOffset).getUint32(0)).toBe(5906);
  });

  it('writes pixels without a resolution, RGB on paper and RGBA without', async () => {
    const paper = decodePng((await figure('quartz.xyz', '-o', 'q.png', ...small)).written['q.png']!);
    expect([paper.width, paper.height, paper.colourType]).toEqual([200, 160, 2]);
    expect(paper.chunks.some(({ type }) => type === 'pHYs')).toBe(false);
    const clear = await figure('quartz.xyz', '-o', 'q.png', '--transparent', ...small);
    expect(decodePng(clear.written['q.png']!).colourType).toBe(6);
  });

  it('refuses a height that would cut the legend off, with the least one', async () => {
    const low = await figure('quartz.xyz', '-o', 'q.png', '--width-mm', '83', '--height-mm', '20');
    expect(low.status).toBe(2);
    expect(low.written).toEqual({});
    const least = /the least is --height-mm (\d+)/.exec(low.error)![1]!;
    const high = await figure('quartz.xyz', '-o', 'q.png', '--width-mm', '83', '--height-mm', least);
    expect(high.status).toBe(0);
  });

  it('says wishes that it could not follow, with what is drawn instead', async () => {
    const { status, error } = await figure(
      ...['quartz.xyz', '-o', 'q.png', '--colour-by', 'difference', '--displacement', 'instead'],
    );
    expect(status).toBe(0);
    expect(error).toMatch(/warning figure-wish-unfollowed There is no difference/);
    expect(error).toMatch(/warning figure-wish-unfollowed The file gives no displacements/);
  });

  it('writes to standard output with -o -', async () => {
    const { status, outBytes, written } = await figure('quartz.xyz', '-o', '-', ...small);
    expect(status).toBe(0);
    expect(decodePng(outBytes!).width).toBe(200);
    expect(written).toEqual({});
  });

  it('puts the case inside, from which the command line reads the same sites', async () => {
    const { written } = await figure('quartz.xyz', '-o', 'q.png', ...small);
    const picture = written['q.png']!;
    expect(textChunk(decodePng(picture), 'ellipsite-case')).toContain('0.02 0.2 0 0 0 -0.3');
    const sites = await runCommand(['sites', 'q.png'], { ...files, 'q.png': picture });
    expect(sites.status).toBe(0);
    expect(sites.out.split('\n').slice(1)).toEqual(
      (await runCommand(['sites', 'quartz.xyz'], files)).out.split('\n').slice(1),
    );
  });

  // Size and parts of the sheet are choices of each run, not of the case: the second run repeats them, as it does the size.
  it.each([
    { view: 'c', parts: ['--no-direction'] },
    { view: 'c', parts: [] },
    { view: '-a*', parts: [] },
    { view: 'uvw:1,1,0', parts: ['--caption'] },
  ])('draws the same bytes again from the case inside, seen along $view $parts', async ({ view, parts }) => {
    const sheet = [...small, ...parts];
    const asked = ['--view', view, '--quantity', 'efg'];
    const first = await figure('quartz.xyz', '-o', 'q.png', ...asked, ...sheet);
    const picture = first.written['q.png']!;
    const withPicture = { ...files, 'q.png': picture };
    const again = await runCommand(['figure', 'q.png', '-o', 'again.png', ...sheet], withPicture);
    expect(again.status).toBe(0);
    const pixels = (bytes: Uint8Array): Buffer => Buffer.from(decodePng(bytes).pixels);
    expect(Buffer.compare(pixels(again.written['again.png']!), pixels(picture))).toBe(0);
  });

  it('leaves the case out with --no-case', async () => {
    const { written } = await figure('quartz.xyz', '-o', 'q.png', '--no-case', ...small);
    expect(textChunk(decodePng(written['q.png']!), 'ellipsite-case')).toBeUndefined();
  });

  it('tells facts as JSON', async () => {
    const { out, written } = await figure('quartz.xyz', '-o', 'q.png', '--json', ...small);
    const said = JSON.parse(out) as { schema: string; figure: Record<string, unknown> };
    expect(said.schema).toBe('ellipsite/figure/1');
    expect(said.figure).toMatchObject({ file: 'q.png', widthPx: 200, heightPx: 160, holdsCase: true });
    expect(said.figure['caption']).toBe(textChunk(decodePng(written['q.png']!), 'Description'));
  });

  it('draws another picture for another view, and the opposite one mirrored in depth', async () => {
    const pixels = async (view: string) =>
      Buffer.from(
        decodePng(
          (await figure('quartz.xyz', '-o', 'q.png', '--view', view, '--no-direction', ...small)).written[
            'q.png'
          ]!,
        ).pixels,
      );
    const [alongC, uvw, alongA, back] = [
      await pixels('c'),
      await pixels('uvw:0,0,1'),
      await pixels('a'),
      await pixels('-c'),
    ];
    expect(Buffer.compare(alongC, uvw)).toBe(0);
    expect(Buffer.compare(alongC, alongA)).not.toBe(0);
    expect(Buffer.compare(alongC, back)).not.toBe(0);
  });

  it('looks along a principal axis of a site, in several spellings', async () => {
    const views = ['Si1 33', 'σ33 of Si1', 'p33(Si1)', 's33 of si1'];
    const pictures: string[] = [];
    for (const view of views) {
      const { status, written, error } = await figure(
        'quartz.xyz',
        '-o',
        'q.png',
        '--view',
        view,
        '--no-case',
        ...small,
      );
      expect([status, error]).toEqual([0, expect.not.stringContaining('--view')]);
      pictures.push(decodePng(written['q.png']!).pixels.join());
    }
    expect(new Set(pictures).size).toBe(1);
    const refused = await figure('quartz.xyz', '-o', 'q.png', '--view', 'p44 of Si1', ...small);
    expect(refused.status).toBe(2);
    expect(refused.error).toContain('p33 of Si1, Si1 33');
  });

  it.each([
    [['--shell', 'Si1:3'], '--shell SITE --radius 3'],
    [['--shell', 'Si1', '--radius', 'far'], '--radius far: allowed are 0.5 to 50'],
    [['--shell', 'Si1', '--range', '0:1,0:1,0:1'], 'exclude each other'],
    [['--shell', 'Si1', '--extent', 'cell'], 'leaves no room for --shell'],
  ])('refuses a shell that would be passed over: %j', async (words, message) => {
    const { status, error } = await figure('quartz.xyz', '-o', 'q.png', ...words, ...small);
    expect(status).toBe(2);
    expect(error).toContain(message);
  });

  it('draws a molecule without a cell', async () => {
    const { status, written } = await figure('water.xyz', '-o', 'w.png', ...small);
    expect(status).toBe(0);
    expect(decodePng(written['w.png']!).width).toBe(200);
  });

  it('warns where the quantity asked for is not there', async () => {
    const { status, error } = await figure('quartz.xyz', '-o', 'q.png', '--quantity', 'shift', ...small);
    expect(status).toBe(0);
    expect(error).toMatch(/warning figure-wish-unfollowed There are no shift tensors/);
  });

  it.each([
    [[], /-o picture\.png/],
    [['-o', 'q.svg'], /svg comes in a later version/],
    [['-o', 'q.pdf'], /pdf comes in a later version/],
    [['-o', 'q.jpeg'], /ends in \.png/],
    [['-o', 'q.png', '--view', 'sideways'], /--view sideways.*a, b, c, a\*/],
    [['-o', 'q.png', '--view', 'uvw:0,0,0'], /one index must differ from 0/],
    [['-o', 'q.png', '--width-px', '20'], /--width-px 20: allowed are 64 to 16384/],
    [['-o', 'q.png', '--width-px', '200.5'], /whole numbers/],
    [['-o', 'q.png', '--width-px', '16384', '--height-px', '16384'], /at most 134 million/],
    [['-o', 'q.png', '--width-mm', '83', '--width-px', '900'], /in mm or in pixels/],
    [['-o', 'q.png', '--height-mm', '83'], /needs --width-mm/],
    [['-o', 'q.png', '--dpi', '9999'], /36 to 2400/],
    [['-o', 'q.png', '--text-pt', '2'], /4 to 96/],
    [['-o', 'q.png', '--theme', 'blue'], /allowed are light, paper, dark/],
    [['-o', 'q.png', '--glyph', 'cube'], /allowed are ellipsoid, polar, axes/],
    [['-o', 'q.png', '--colour-by', 'mood'], /allowed are isotropic, span/],
    [['-o', 'q.png', '--limits', '9,3'], /the lower and the upper end/],
    [['-o', 'q.png', '--range', '0:1,0:1'], /three ranges of cells/],
    [['-o', 'q.png', '--extent', 'range'], /needs --range/],
    [['-o', 'q.png', '--elements', 'Xx'], /allowed are Si, O/],
    [['-o', 'q.png', '--sites', 'Q9'], /no such site/],
    [['-o', 'q.png', '--perspective', '170'], /0 to 90/],
    [['-o', '-', '--json'], /both write to standard output/],
    [['-o', 'no-such-folder/q.png', ...small], /its folder does not exist/],
    [['-o', 'q.png', '--wiht-mm', '83'], /No option is called --wiht-mm/],
  ])('refuses %j with one sentence', async (words, sentence) => {
    const { status, error, out, written } = await figure('quartz.xyz', ...words);
    expect(status).toBe(2);
    expect(error).toMatch(sentence);
    expect(error).not.toMatch(/\n\s+at /);
    expect(out).toBe('');
    expect(written).toEqual({});
  });

  it('refuses a cell axis where there is no cell', async () => {
    const { status, error } = await figure('water.xyz', '-o', 'w.png', '--view', 'a');
    expect(status).toBe(2);
    expect(error).toMatch(/There is no cell.*x, y, z/);
  });

  it('writes nothing where there is no structure, with status 1', async () => {
    const { status, error, written } = await runCommand(['figure', 'x.txt', '-o', 'q.png'], {
      'x.txt': 'hello',
    });
    expect(status).toBe(1);
    expect(error).toContain('error');
    expect(written).toEqual({});
  });

  it('has a manual page with an example, and stands in the list of commands', async () => {
    const page = await runCommand(['figure', '--help']);
    expect(page.status).toBe(0);
    expect(page.out).toMatch(/ellipsite figure .*--width-mm 83 --dpi 300 -o/);
    expect((await runCommand(['--help'])).out).toMatch(/figure .*-o crystal\.png/);
  });

  it('names every option of its own in the manual page', async () => {
    const { out } = await runCommand(['figure', '--help']);
    const { figureOptions } = await import('#src/cli/figure-options.ts');
    const { sceneOptionWords } = await import('#src/cli/figure-scene-options.ts');
    const quiet = ['output', 'no-caption'];
    const names = [...Object.keys(figureOptions), ...Object.keys(sceneOptionWords)].filter(
      (name) => !quiet.includes(name),
    );
    for (const name of names) expect(out).toContain(`--${name}`);
  });
});
