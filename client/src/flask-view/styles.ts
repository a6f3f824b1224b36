/** How the page looks; every colour is the theme's, and forced colours are left to the system. */
export const STYLES = `
body { font: var(--vscode-font-size, 13px) var(--vscode-font-family, sans-serif); color: var(--vscode-foreground); background: var(--vscode-editor-background); padding: 0 12px 12px; }
h1 { font-size: 1.25em; margin: 12px 0 2px; }
#facts { margin: 0 0 10px; color: var(--vscode-foreground); }
#tabs { display: flex; gap: 2px; border-bottom: 1px solid var(--vscode-panel-border, currentColor); }
button { font: inherit; color: var(--vscode-foreground); background: transparent; border: 1px solid transparent; padding: 4px 10px; cursor: pointer; }
button[role=tab][aria-selected=true] { border-bottom: 2px solid var(--vscode-focusBorder, currentColor); font-weight: 600; }
button:focus-visible, #panel:focus-visible, .rung:focus-visible { outline: 1px solid var(--vscode-focusBorder, currentColor); outline-offset: -1px; }
#tools button { border-color: var(--vscode-button-border, var(--vscode-panel-border, currentColor)); margin-right: 6px; }
#panel { overflow: auto; padding: 8px 0; }
svg { max-width: 100%; height: auto; font-family: var(--vscode-font-family, sans-serif); }
svg text { fill: var(--vscode-foreground); font-size: 11px; }
.axis path, .axis line { stroke: var(--vscode-foreground); fill: none; opacity: .6; }
.window { fill: var(--vscode-editor-selectionBackground, #8884); opacity: .45; }
.acidity { stroke: var(--vscode-charts-red, #c33); stroke-width: 1.5; stroke-dasharray: 6 3; }
.acidity-label { font-weight: 600; }
.rung-frame { fill: none; stroke: var(--vscode-foreground); }
.rung-filled { fill: var(--vscode-charts-blue, #37c); }
.head { stroke: var(--vscode-foreground); }
.held { fill: var(--vscode-charts-blue, #37c); }
.lost { fill: var(--vscode-editor-background); }
.spread, .leader { stroke: var(--vscode-foreground); fill: none; opacity: .55; }
.transfer { fill: none; stroke: var(--vscode-charts-green, #383); stroke-width: 2; }
.transfer.undecided { stroke: var(--vscode-charts-orange, #b60); stroke-dasharray: 6 3; }
.transfer.no { stroke: var(--vscode-charts-red, #c33); stroke-dasharray: 2 3; }
.arrow-head { fill: var(--vscode-foreground); }
.curve { fill: none; stroke-width: 2; }
.colour-0 { stroke: var(--vscode-charts-blue, #37c); } .colour-1 { stroke: var(--vscode-charts-red, #c33); }
.colour-2 { stroke: var(--vscode-charts-green, #383); } .colour-3 { stroke: var(--vscode-charts-orange, #b60); }
.colour-4 { stroke: var(--vscode-charts-purple, #83a); } .colour-5 { stroke: var(--vscode-foreground); }
.solvent-bar { fill: var(--vscode-charts-blue, #37c); opacity: .55; }
.mine .solvent-bar { opacity: 1; stroke: var(--vscode-foreground); }
.mine text { font-weight: 700; }
table { border-collapse: collapse; }
caption { text-align: left; padding: 4px 0; }
th, td { text-align: left; padding: 2px 10px 2px 0; border-bottom: 1px solid var(--vscode-panel-border, #8886); white-space: nowrap; }
@media (forced-colors: active) { .rung-filled, .held, .solvent-bar { fill: CanvasText; } .transfer, .curve, .acidity { stroke: CanvasText; } }
`;
