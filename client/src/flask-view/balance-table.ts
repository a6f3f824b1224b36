/** The proton balance as a table. */
import type { FlaskPicture } from '../../../server/src/answers/flask-picture.ts';
import { figure, oneDecimal, percent } from './layout.ts';

const HEAD = ['Substance', 'Atom', 'Group', 'pKa', '±', 'mmol', 'Protonated', 'As charged', 'Origin'];

/** Rows of the table with its head. */
export function balanceRows({ rungs }: FlaskPicture): string[][] {
  const rows = rungs.map(
    ({ substance, element, atom, group, pKa, sd, mol, protonated, charged, origin, sources }) => [
      substance,
      `${element}${atom}`,
      group,
      oneDecimal(pKa),
      oneDecimal(sd),
      figure(mol * 1000),
      percent(protonated),
      percent(charged),
      [origin, ...sources].join(', '),
    ],
  );
  return [HEAD, ...rows];
}

export function drawBalance(parent: HTMLElement, flask: FlaskPicture): void {
  const table = parent.appendChild(document.createElement('table'));
  table.createCaption().textContent = `Proton balance of step ${flask.step}`;
  const [head, ...rows] = balanceRows(flask);
  const top = table.createTHead().insertRow();
  for (const text of head!) {
    const cell = top.appendChild(document.createElement('th'));
    cell.scope = 'col';
    cell.textContent = text;
  }
  const body = table.createTBody();
  for (const cells of rows) {
    const row = body.insertRow();
    for (const text of cells) row.insertCell().textContent = text;
  }
  const notes = [
    ...flask.gases.map(({ name, mol }) => `${figure(mol * 1000)} mmol of ${name} leave as gas.`),
    ...(flask.leftOut === 0 ? [] : [`${flask.leftOut} further couples are not shown.`]),
  ];
  for (const text of notes) parent.appendChild(document.createElement('p')).textContent = text;
}
