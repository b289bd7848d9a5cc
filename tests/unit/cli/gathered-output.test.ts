import { describe, expect, it } from 'vitest';
import { gatheredOutput } from '#src/cli/gathered-output.ts';

function gather(capacity: number) {
  const written: Uint8Array[] = [];
  const output = gatheredOutput((bytes) => void written.push(bytes), capacity);
  const texts = () => written.map((bytes) => new TextDecoder().decode(bytes));
  return { output, texts };
}

describe('gatheredOutput', () => {
  it('writes small pieces together, at the latest when flushed', () => {
    const { output, texts } = gather(100);
    for (const piece of ['one ', 'two ', 'three']) output.text(piece);
    expect(texts()).toEqual([]);
    output.flush();
    expect(texts()).toEqual(['one two three']);
    output.flush();
    expect(texts()).toHaveLength(1);
  });

  it('keeps every character of any width, whatever does not fit any more included', () => {
    const pieces = Array.from({ length: 50 }, (_none, index) => `σ${index}€😀a`);
    const { output, texts } = gather(40);
    pieces.forEach(output.text);
    output.flush();
    expect(texts().join('')).toBe(pieces.join(''));
    expect(texts().length).toBeGreaterThan(1);
    expect(texts().length).toBeLessThan(50);
  });

  it('writes a piece larger than all it holds by itself, and bytes in their place', () => {
    const { output, texts } = gather(12);
    output.text('a');
    output.text('β'.repeat(50));
    output.text('c');
    output.bytes(new TextEncoder().encode('bytes'));
    output.text('d');
    output.flush();
    expect(texts()).toEqual(['a', 'β'.repeat(50), 'c', 'bytes', 'd']);
  });
});
