/** Screening over the project's own tables: every pair is answered, by the judge, in the order a chemist would look. */
import { expect, test } from 'vitest';
import { perceive } from '../../server/src/chemistry/perceive.ts';
import { choicesAs, solventChoice } from '../../server/src/flask/choices.ts';
import { judgeTransfer } from '../../server/src/flask/judge.ts';
import type { Contents, Ingredient } from '../../server/src/flask/state.ts';
import { type Screening, screen, type Want } from '../../server/src/flask/suggest.ts';
import { foldName } from '../../server/src/tables/fold-name.ts';
import { tables } from '../support/tables.ts';

const plain = { reagent: null, solvent: null, assumed: false, qualifier: null } as const;

/** A flask of one compound with its site marked :1, one solvent and one base or acid. */
function want(
  smiles: string,
  acting: string,
  inSolvent: string,
  {
    celsius = 25,
    direction = 'deprotonate' as 'deprotonate' | 'protonate',
    breadth = 'ordinary' as 'ordinary' | 'all',
    besides = [] as string[],
  } = {},
): Want {
  const solvent = tables.solventByName.get(foldName(inSolvent))!;
  const reagent = tables.reagentByName.get(foldName(acting))!;
  const molecule = perceive(smiles, tables);
  const compound = (text: string, id: number): Ingredient => ({
    ...plain,
    id,
    name: text,
    molecule: perceive(text, tables),
    mol: 0.01,
    volume: null,
    role: 'compound',
  });
  const contents: Contents = {
    temperature: celsius + 273.15,
    ingredients: [
      {
        ...plain,
        id: 0,
        name: inSolvent,
        molecule: perceive(solvent.smiles, tables),
        mol: 0,
        volume: 0.05,
        role: 'solvent',
        solvent,
      },
      compound(smiles, 1),
      {
        ...plain,
        id: 2,
        name: acting,
        molecule: perceive(reagent.smiles!, tables),
        mol: 0.011,
        volume: null,
        role: direction === 'deprotonate' ? 'base' : 'acid',
        reagent,
      },
      ...besides.map((text, place) => compound(text, 3 + place)),
    ],
  };
  const marked = molecule.graph!.atoms.filter(({ mapNumber }) => mapNumber === 1).map(({ index }) => index);
  const couples = molecule.couples.flatMap(({ equivalents, holdsProton }, place) =>
    holdsProton === (direction === 'deprotonate') && equivalents.some((atom) => marked.includes(atom))
      ? [place]
      : [],
  );
  return {
    contents,
    intent: { ingredient: 1, couples, direction },
    acting: [2],
    solvents: [0],
    equiv: 1.1,
    where: 'anywhere',
    breadth,
  };
}

const ACETOPHENONE = 'O=C([CH3:1])c1ccccc1';
const ketone = screen(want(ACETOPHENONE, 'NaOH', 'water', { breadth: 'all' }), tables);

function names({ options }: Screening): string[] {
  return [...new Set(options.map(({ reagent }) => reagent.name))];
}

function reasons({ rejections }: Screening, name: string): string[] {
  return [
    ...new Set(rejections.filter(({ reagent }) => reagent?.name === name).map(({ reason }) => reason.kind)),
  ];
}

test('a ketone is offered strong bases that add to nothing, in solvents that stand them', () => {
  expect(ketone.asWritten?.answer).toBe('no');
  expect(names(ketone).slice(0, 8)).toEqual(expect.arrayContaining(['LDA', 'LiHMDS', 'NaH']));
  expect(names(ketone)).not.toContain('Et3N');
  expect(names(ketone)).not.toContain('n-BuLi');
  expect(reasons(ketone, 'Et3N')).toContain('too-weak');
  expect(reasons(ketone, 'n-BuLi')).toEqual(['attacks']);
  for (const { reagent, solvent } of ketone.options)
    if (reagent.name === 'LDA') expect(['ether']).toContain(solvent!.kind);
});

test('an option carries the verdict of the judge on the flask with the option in it', () => {
  const question = want(ACETOPHENONE, 'NaOH', 'water');
  const { options } = screen(question, tables);
  for (const option of options.slice(0, 10)) {
    const { reagent, solvent, equiv, temperature } = option;
    const contents: Contents = {
      temperature,
      ingredients: [
        {
          ...plain,
          id: 3,
          name: solvent!.name,
          molecule: perceive(solvent!.smiles, tables),
          mol: 0,
          volume: 0.05,
          role: 'solvent',
          solvent,
        },
        question.contents.ingredients[1]!,
        {
          ...plain,
          id: 4,
          name: reagent.name,
          molecule: perceive(reagent.smiles!, tables),
          mol: equiv * 0.01,
          volume: null,
          role: 'base',
          reagent,
        },
      ],
    };
    const verdict = judgeTransfer(contents, question.intent, tables)!;
    expect(verdict.answer).toBe(option.verdict.answer);
    expect(verdict.margin).toBeCloseTo(option.verdict.margin, 9);
  }
});

test('every pair is an option or has its reason', () => {
  const solvents = tables.solvents.filter((one) => solventChoice(one, tables).usual !== 'never');
  for (const { reagent, row } of choicesAs('base', tables)) {
    const refused = ketone.rejections.filter((one) => one.reagent === reagent);
    const offered = ketone.options.filter((one) => one.reagent === reagent);
    if (row.usual === 'never' || refused.some(({ reason }) => reason.kind === 'attacks')) {
      expect(offered).toEqual([]);
      continue;
    }
    const answered = [...refused, ...offered].map(({ solvent }) => solvent?.name);
    expect(answered.sort()).toEqual(solvents.map(({ name }) => name).sort());
  }
});

test('what bare constants call hopeless the judge refuses too', () => {
  const question = want(ACETOPHENONE, 'NaOH', 'water');
  const hopeless = ketone.rejections.filter(({ reason }) => reason.kind === 'too-weak');
  expect(hopeless.length).toBeGreaterThan(100);
  for (let place = 0; place < hopeless.length; place += 40) {
    const { reagent, solvent } = hopeless[place]!;
    const contents: Contents = {
      temperature: 298.15,
      ingredients: [
        {
          ...plain,
          id: 3,
          name: solvent!.name,
          molecule: perceive(solvent!.smiles, tables),
          mol: 0,
          volume: 0.05,
          role: 'solvent',
          solvent,
        },
        question.contents.ingredients[1]!,
        {
          ...plain,
          id: 4,
          name: reagent!.name,
          molecule: perceive(reagent!.smiles!, tables),
          mol: 0.011,
          volume: null,
          role: 'base',
          reagent,
        },
      ],
    };
    const verdict = judgeTransfer(contents, question.intent, tables);
    expect(verdict?.answer, `${reagent!.name} in ${solvent!.name}`).not.toBe('yes');
  }
});

test('a phenol asks for no more than carbonate or an amine', () => {
  const screening = screen(want('COC(=O)c1ccc([OH:1])cc1', 'NaOAc', 'DMF'), tables);
  expect(names(screening).slice(0, 3)).toEqual(expect.arrayContaining(['K2CO3', 'DBU']));
  expect(screening.options[0]!.solvent?.name).toBe('DMF');
  expect(reasons(screening, 'NaOH')).toEqual(['attacks']);
});

test('a site that goes first is covered by the amount', () => {
  const { options } = screen(want('O=C([CH3:1])c1ccc(O)cc1', 'LDA', 'THF', { celsius: -78 }), tables);
  const [best] = options;
  expect(best!.reagent.name).toBe('LDA');
  expect(best!.ahead).toHaveLength(1);
  expect(best!.equiv).toBeGreaterThan(2);
});

test('solvents that are frozen or boil at the temperature are left out', () => {
  const { options, rejections } = screen(want(ACETOPHENONE, 'LDA', 'THF', { celsius: -78 }), tables);
  expect(options.some(({ solvent }) => solvent?.name === 'dioxane')).toBe(false);
  expect(
    rejections.some(({ solvent, reason }) => solvent?.name === 'dioxane' && reason.kind === 'frozen'),
  ).toBe(true);
  const hot = screen(want('OC(=O)[CH2:1]C(=O)OCC', 'NaOEt', 'EtOH', { celsius: 90 }), tables);
  expect(
    hot.rejections.some(({ solvent, reason }) => solvent?.name === 'THF' && reason.kind === 'boils'),
  ).toBe(true);
});

test('a base keeps off other compounds of the flask', () => {
  const alone = screen(want('CCCCC#[CH:1]', 'LDA', 'THF', { celsius: -78 }), tables);
  expect(names(alone)).toContain('n-BuLi');
  const beside = screen(
    want('CCCCC#[CH:1]', 'LDA', 'THF', { celsius: -78, besides: ['CC(=O)c1ccccc1'] }),
    tables,
  );
  expect(reasons(beside, 'n-BuLi')).toEqual(['attacks']);
});

test('an amine beside a Boc group is offered acids that leave it there', () => {
  const screening = screen(
    want('CC(C)(C)OC(=O)NCC[NH2:1]', 'benzoic acid', 'MeOH', { direction: 'protonate' }),
    tables,
  );
  expect(names(screening).length).toBeGreaterThan(3);
  expect(reasons(screening, 'TFA')).toEqual(['attacks']);
  expect(reasons(screening, 'HCl')).toEqual(['attacks']);
});

test('the same question gives the same list', () => {
  const ask = () =>
    screen(want(ACETOPHENONE, 'NaOH', 'water'), tables).options.map(({ reagent, solvent, cost }) => [
      reagent.name,
      solvent?.name,
      cost,
    ]);
  expect(ask()).toEqual(ask());
});

test('solvents that are never proposed are named with the reason', () => {
  const benzene = ketone.rejections.find(
    ({ solvent, reagent }) => solvent?.name === 'benzene' && reagent === null,
  );
  expect(benzene?.reason).toMatchObject({
    kind: 'not-proposed',
    note: expect.stringContaining('carcinogen'),
  });
  expect(ketone.options.some(({ solvent }) => solvent?.name === 'benzene')).toBe(false);
});

test('a base that falls apart in a solvent says how long it lives there and comes later', () => {
  const { options } = screen(want('CCCCC#[CH:1]', 's-BuLi', 'THF', { celsius: -20 }), tables);
  const butyl = options.filter(({ reagent }) => reagent.name === 'n-BuLi');
  const inThf = butyl.find(({ solvent }) => solvent?.name === 'THF')!;
  expect(inThf.halfLife).toBeGreaterThan(17);
  const inDme = butyl.find(({ solvent }) => solvent?.name === 'DME')!;
  expect(inDme.halfLife).toBeCloseTo(1.85, 1);
  expect(inThf.cost).toBeLessThan(inDme.cost);
});
