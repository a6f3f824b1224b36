/**
 * The page of the Flask view: tabs of pictures of one flask, redrawn whenever the extension sends another.
 *
 * Works out nothing about chemistry; every figure comes with the picture.
 */
import type { FlaskPicture } from '../../../server/src/answers/flask-picture.ts';
import { balanceRows, drawBalance } from './balance-table.ts';
import { pngOf, svgText } from './copy.ts';
import { drawLadder } from './ladder.ts';
import { figure, oneDecimal, toTsv } from './layout.ts';
import type { FromPage, ToPage } from './messages.ts';
import { drawSpeciation } from './speciation.ts';
import { drawWindows } from './windows.ts';

declare function acquireVsCodeApi(): {
  postMessage(message: FromPage): void;
  getState(): { tab?: string } | undefined;
  setState(state: { tab: string }): void;
};

type Draw = (parent: HTMLElement, flask: FlaskPicture) => SVGSVGElement | undefined;

const TABS: readonly { readonly id: string; readonly title: string; readonly draw: Draw }[] = [
  { id: 'ladder', title: 'Ladder', draw: drawLadder },
  { id: 'speciation', title: 'Speciation', draw: drawSpeciation },
  {
    id: 'balance',
    title: 'Balance',
    draw: (parent, flask) => {
      drawBalance(parent, flask);
      return undefined;
    },
  },
  { id: 'windows', title: 'Solvents', draw: drawWindows },
];

const editor = acquireVsCodeApi();
const page = document.body.appendChild(document.createElement('main'));
const heading = element('h1', 'heading');
const facts = element('p', 'facts');
const tabList = element('div', 'tabs');
const panel = element('div', 'panel');
const tools = element('div', 'tools');
const status = element('p', 'status');
let flask: FlaskPicture | null = null;
let drawn: SVGSVGElement | undefined;
let open = TABS.find(({ id }) => id === editor.getState()?.tab) ?? TABS[0]!;

tabList.setAttribute('role', 'tablist');
tabList.setAttribute('aria-label', 'Pictures of the flask');
panel.setAttribute('role', 'tabpanel');
panel.tabIndex = 0;
status.setAttribute('role', 'status');
for (const tab of TABS) {
  const button = tabList.appendChild(document.createElement('button'));
  button.id = `tab-${tab.id}`;
  button.textContent = tab.title;
  button.setAttribute('role', 'tab');
  button.setAttribute('aria-controls', 'panel');
  button.addEventListener('click', () => show(tab));
}
tabList.addEventListener('keydown', (event) => {
  const step = { ArrowRight: 1, ArrowLeft: -1 }[event.key];
  if (step === undefined) return;
  show(TABS[(TABS.indexOf(open) + step + TABS.length) % TABS.length]!);
  document.getElementById(`tab-${open.id}`)?.focus();
});
window.addEventListener('message', ({ data }: MessageEvent<ToPage>) => {
  if (data.kind === 'picture') flask = data.picture;
  else flask = null;
  heading.textContent =
    flask === null ? 'No flask here' : `Step ${flask.step}${flask.title === null ? '' : ` · ${flask.title}`}`;
  facts.textContent = data.kind === 'picture' ? summary(data.picture, data.file) : data.why;
  redraw();
});
redraw();
editor.postMessage({ kind: 'ready' });

function element<Name extends keyof HTMLElementTagNameMap>(
  name: Name,
  id: string,
): HTMLElementTagNameMap[Name] {
  const made = document.createElement(name);
  made.id = id;
  return page.appendChild(made);
}

function show(tab: (typeof TABS)[number]): void {
  open = tab;
  editor.setState({ tab: tab.id });
  redraw();
}

function redraw(): void {
  for (const tab of TABS) {
    const button = document.getElementById(`tab-${tab.id}`)!;
    button.setAttribute('aria-selected', String(tab === open));
    button.tabIndex = tab === open ? 0 : -1;
  }
  panel.setAttribute('aria-labelledby', `tab-${open.id}`);
  panel.replaceChildren();
  tools.replaceChildren();
  status.textContent = '';
  drawn = undefined;
  if (flask === null) return;
  if (flask.rungs.length === 0 && open.id !== 'windows') {
    panel.appendChild(document.createElement('p')).textContent =
      'Nothing in this flask gives or takes a proton.';
    return;
  }
  drawn = open.draw(panel, flask);
  if (drawn === undefined) tool('Copy as table', copyTable);
  else {
    tool('Copy as SVG', copySvg);
    tool('Copy as PNG', copyPng);
  }
  const { line } = flask;
  tool('Go to line', () => editor.postMessage({ kind: 'go', line }));
}

function tool(title: string, action: () => void): void {
  const button = tools.appendChild(document.createElement('button'));
  button.textContent = title;
  button.addEventListener('click', action);
}

function copyTable(): void {
  if (flask === null) return;
  editor.postMessage({ kind: 'copy', text: toTsv(balanceRows(flask)), what: 'The table' });
}

function copySvg(): void {
  if (drawn !== undefined) editor.postMessage({ kind: 'copy', text: svgText(drawn), what: 'The picture' });
}

async function copyPng(): Promise<void> {
  if (drawn === undefined) return;
  try {
    await navigator.clipboard.write([new ClipboardItem({ 'image/png': await pngOf(drawn) })]);
    status.textContent = 'The picture is in the clipboard.';
  } catch (error) {
    status.textContent = `The picture could not be copied: ${error instanceof Error ? error.message : String(error)}`;
  }
}

function summary(
  { line, media, volume, assumedVolume, temperature, pH, scale }: FlaskPicture,
  file: string,
): string {
  const parts = [
    `${file}, after line ${line + 1}`,
    media.join(', '),
    `${figure(volume * 1000)} mL${assumedVolume ? ' assumed' : ''}`,
    `${figure(temperature - 273.15)} °C`,
    pH === null ? '' : `pH ${oneDecimal(pH)} on the ${scale} scale`,
  ];
  return parts.filter((part) => part !== '').join(' · ');
}
