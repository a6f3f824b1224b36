/** The intended proton transfer does not happen: less than a tenth of the site reacts. */

import { defineCheck } from './define.ts';
import { nameOf, partnerName, percent, reportKind, severityOf, unit } from './verdicts.ts';

export default defineCheck({
  name: 'transfer-uphill',
  family: 'direction',
  severity: 'error',
  summary: 'The intended proton transfer does not happen: less than a tenth of the site reacts.',
  why: 'A base whose conjugate acid is more acidic than the site leaves the proton where it is, and the step after it fails.',
  remedy:
    'Take a base whose conjugate acid lies at least two units above the site in this solvent, or change the solvent.',
  silentWhen:
    'Where a conversion consumes the small amount that forms (log K of −8 or more), where a metal binds the site, and where the uncertainty leaves it open.',
  sources: ['bordwell-1988'],
  wrong: `compound K = O=C([CH3:1])c1ccccc1
step A
  solvent water 30 mL
  charge K 10 mmol
  base NaOH 1.1 equiv
  deprotonate K at :1
`,
  right: `compound K = O=C([CH3:1])c1ccccc1
step A
  solvent THF 20 mL
  temperature -78 °C
  charge K 5 mmol
  base LDA 1.1 equiv 2.0 M in THF
  deprotonate K at :1
`,
  inStep: (facts) =>
    reportKind(facts, 'uphill', ({ verdict }) => {
      const { partner, site, logK, sd, extent } = verdict;
      const verb = site.couple.holdsProton ? 'weak' : 'weak an acid';
      const message =
        partner === null
          ? `Nothing in this flask ${site.couple.holdsProton ? 'takes' : 'gives'} the proton: ${nameOf(facts, site)} (pKa ${unit(site)}) stays as it is.`
          : `${partnerName(facts, verdict)} (pKa ${partner.constant.value.toFixed(1)}) is ${Math.abs(logK).toFixed(1)} ± ${sd.toFixed(1)} units too ${verb} for the ${nameOf(facts, site)} (pKa ${unit(site)}): at these amounts ${percent(extent)} reacts.`;
      return { message, severity: severityOf(verdict, facts) };
    }),
});
