import { describe, expect, it } from 'vitest';
import { maskMarkdown } from '../../server/src/route/markdown.ts';
import { plan, problemsOf } from './draw.ts';

const PAGE = `# Route

compound 9 = CCO is prose

\`\`\`lyate sound
compound 1 = CC[OH:1]
step A
  charge 1 1 mmol
\`\`\`

and then

~~~~lyate
  base Nonsensium 1 equiv
~~~
step B
~~~~

\`\`\`python
step C
\`\`\`
`;

describe('a Markdown page', () => {
  it('keeps its lines where they are', () => {
    const masked = maskMarkdown(PAGE).split('\n');
    expect(masked).toHaveLength(PAGE.split('\n').length);
    expect(masked[5]).toBe('compound 1 = CC[OH:1]');
    expect(masked.filter((line) => line !== '')).toHaveLength(6);
  });

  it('is one plan over all its fences, with the places of the page', () => {
    const resolved = plan(PAGE, { language: 'markdown' });
    expect(resolved.steps.map(({ label, firstLine }) => [label, firstLine])).toEqual([
      ['A', 6],
      ['B', 15],
    ]);
    expect(problemsOf(PAGE, resolved)).toEqual([
      { check: 'unknown-name', text: 'Nonsensium', line: 13 },
      { check: 'unreadable-line', text: '~~~', line: 14 },
    ]);
  });
});
