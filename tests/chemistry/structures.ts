/**
 * Structures of every kind that the trade writes, and seeded changes of them, for comparisons with an independent reader.
 */
import type { Structure } from '../../server/src/chemistry/molecule.ts';

/** Sound and unsound texts; which is which is for the comparison to say. */
export const STRUCTURES: readonly string[] = `
CCO CC(=O)O c1ccccc1O C#Cc1ccccc1 CC(C)[N-]C(C)C.[Li+] [Li]CCCC C[Mg]Br [H-].[Na+] [BH4-].[Na+] CC[O-].[Na+]
O=C([O-])[O-].[K+].[K+] CCOC(=O)[CH2:1]C(=O)OCC N[C@@H](Cc1ccccc1)C(=O)O C/C=C/C(=O)OC F/C=C\\F C%12CCCCC%12
CS(=O)(=O)Cl CN(C)C=O C[N+](=O)[O-] CN(=O)=O [13CH3]C#N O=S(=O)(c1ccccc1)Nc1nccs1 C1CC2CCC1CC2
CC(C)(C)OC(=O)N1CCC(O)CC1 CCP(=O)(OCC)OCC c1c[nH]cn1 BrCCCc1ccccc1 [H]O[H] [H][H] [2H]C([2H])([2H])O [H]C#C[H]
[NH4+].[Cl-] C[N+](C)(C)C.[OH-] C[n+]1ccccc1 Cn1cc[n+](C)c1 CN=[N+]=[N-] CN=N#N C=[N+]=[N-] C=N#N [N-]=[N+]=[N-].[Na+]
[C-]#[O+] C[N+]#[C-] C[N+]([O-])(C)C [O-][n+]1ccccc1 O=n1ccccc1 c1ccc[n+]([O-])c1 CS(C)=O C[S+](C)[O-] CS(C)(=O)=C C[S+](C)C
C=S(C)(C)=O CP(C)C C=P(c1ccccc1)(c1ccccc1)c1ccccc1 [CH2-][P+](C)(C)C OP(=O)(O)O OP(O)O CP(=O)(O)O F[P-](F)(F)(F)(F)F
FP(F)(F)(F)F ClP(Cl)Cl ClP(Cl)(Cl)(Cl)Cl O=P(Cl)(Cl)Cl FS(F)(F)(F)(F)F OS(=O)(=O)O CS(=O)(=O)[O-] OCl(=O)(=O)=O
[O-]Cl(=O)(=O)=O [O-][Cl+3]([O-])([O-])[O-] OI(=O)(=O)=O OBr(=O)=O O=I(=O)c1ccccc1 CC(=O)OI(OC(C)=O)c1ccccc1
CC(=O)OI1(OC(C)=O)(OC(C)=O)OC(=O)c2ccccc21 FI(F)(F)(F)F FI(F)(F)(F)(F)(F)F F[Xe]F FB(F)F F[B-](F)(F)F OB(O)c1ccccc1
CC1(C)OB(c2ccccc2)OC1(C)C B1OCCO1 C[Si](C)(C)C F[Si-](F)(F)(F)F C[SiH3] C[Sn](C)(C)C Cl[Sn](Cl)(Cl)Cl C[Zn]C Cl[Zn]Cl
C[Al](C)C [AlH4-].[Li+] [AlH3] [BH3] [Na]OCC CCO[Ti](OCC)(OCC)OCC O=[Mn](=O)(=O)[O-].[K+] O=[Cr](=O)=O [Pd] [Pt+2]
[Fe+2] [Cu]I [Ag+] [Hg] C[Hg]Cl [OH-].[K+] O=[Os](=O)(=O)=O Cl[Pd]Cl [CH3] [CH2] C[CH2] [O] [OH] [NH2] [CH3+] [CH3-]
[NH2-] [NH-2] [O-2] [S-2] [N-3] [C-]#N [C-]#C C#[N+]C O=C=O O=C=Nc1ccccc1 S=C=S N#CN=C=S CC#[NH+]
c1ccccc1 c1ccncc1 c1ccoc1 c1ccsc1 c1cc[nH]c1 c1cc[se]c1 c1cc[te]c1 c1cc[pH]c1 c1ccpcc1 c1cc[as]cc1 [cH-]1cccc1
[C-]1C=CC=C1 C1=C[CH-]C=C1 [cH+]1cccccc1 C1=CC=C[CH+]C=C1 [CH+]1C=C1 C1=CC1 [cH+]1cc1 O=C1C=C1 O=c1cc1 O=C1C=CC=CC=C1 O=c1cccccc1
Oc1ccccccc1=O C1=CC=CC=CC=C1 c1cccccccc1 [CH-]1C=CC=CC=CC=C1 C1=CC=CC=1 C1=CC=C1 c1ccc1 C1=CCC=C1 c1cccc1 b1ccccc1 B1C=CC=C1
[bH]1cccc1 B1OC=CO1 b1occo1 C1=CB(C)C=CN1 b1nbnbn1 [bH]1[nH][bH][nH][bH][nH]1 B1NBNBN1 [siH]1ccccc1 C1=[SiH]C=CC=C1
O=c1cc[nH]cc1 O=c1cccc[nH]1 O=C1C=CC=CN1 Oc1ccccn1 O=c1cc[nH]c(=O)[nH]1 O=C1C=CNC(=O)N1 Cn1c(=O)c2c(ncn2C)n(C)c1=O
O=c1ccc2ccccc2o1 O=C1C=CC2=CC=CC=C2O1 O=c1ccoc2ccccc12 S=c1cc[nH]cc1 N=c1cc[nH]cc1 C=c1cccccc1 C=C1C=CC=C1 C=c1cccc1
N=c1cccc1 O=c1cccc1 O=C1C=CC=C1 O=C1C=CC(=O)C=C1 O=c1ccc(=O)cc1 O=C1C(=O)C=CC=C1 O=C1NC(=O)C=C1 O=c1ssc2ccccc12 O=c1[nH]sc2ccccc12
O=S1(=O)NC(=O)c2ccccc21 O=s1cccc1 O=S1C=CC=C1 O=S1(=O)C=CC=C1 c1ccc2c(c1)S(=O)(=O)C=C2 C1=CS(=O)C=CN1 c1cs(=O)cn1 [s+]1ccccc1 [o+]1ccccc1
c1cc[o+]cc1 C[s+]1cccc1 C[S+]1C=CC=C1 c1csc[n+]1C Cc1sc[n+](Cc2cnc(C)nc2N)c1CCO c1ccc2ccccc2c1 c1ccc2c(c1)cccc2 c1ccc2cccc-2cc1
C1=CC2=CC=CC=CC2=C1 c1ccc2[nH]ccc2c1 c1ccc2c(c1)[nH]c1ccccc12 c1ccc2c(c1)Cc1ccccc1-2 [cH-]1c2ccccc2c2ccccc12 C1C=Cc2ccccc21 [cH-]1ccc2ccccc12
c1cc2cccc3c2c(c1)CC3 c1cc2ccc3cccc4ccc(c1)c2c34 c1ccc-2c(c1)-c1cccc3cccc2c13 C1=Cc2cccc3cccc1c23 c1cc2ccc3ccc4ccc5ccc6ccc1c1c2c3c4c5c61
c1ccc(-c2ccccc2)cc1 c1ccc(cc1)c1ccccc1 c1ccccc1c1ccccc1 c1ccccc1-c1ccncc1 c1cn2ccccc2n1 c1ccn2cccc2c1 c1cc2cccn2c1 n1cnc2[nH]cnc2c1 Nc1ncnc2nc[nH]c12
c1nn[nH]n1 c1nnn[nH]1 c1nn[n-]n1 c1c[n-]cn1 c1cc[n-]c1 c1nc[nH+]c[nH]1 c1c[nH+]c[nH]1 c1cc[nH+]cc1 [nH]1ccccc1 n1cccc1 c1cnoc1 c1cnsn1 c1cocn1 c1nnco1 c1nncs1
c1cnn[nH]1 c1ccc2[nH]nnc2c1 On1nnc2ccccc21 Cn1ccnc1 CN1C=C[N+](C)=C1[C-] [C]1N(C)C=CN1C Cn1cc[n+](C)[c-]1 [O-][n+]1onc2ccccc12 c1ccc2nonc2c1 c1ccc2nsnc2c1
O=[n+]1([O-])ccccc1 C1=NC=NC=N1 c1ncncn1 n1nnnnn1 c1ccnnc1 c1cnccn1 c1cc2cnccc2cn1 c1cc2nc3ccccc3cc2cn1 c1ccc2nc3ccccc3nc2c1 N#Cc1c(C#N)nccn1
O=C(O)c1ccccc1O OC(=O)CC(O)(C(O)=O)CC(O)=O OC1=C(O)C(=O)OC1C(O)CO [O-]C1=C(O)C(=O)OC1C(O)CO.[Na+] CC(=O)CC(C)=O CC(O)=CC(C)=O CC([O-])=CC(C)=O CC(=C)[O-].[Li+]
[CH2-]C(C)=O C=C(O[Li])C N#CCC#N N#C[CH-]C#N [CH2-][N+](=O)[O-] C=[N+]([O-])[O-] C=N(=O)[O-] CC(=O)N CC(=O)[NH-] CC(=O)[NH3+] CC(=[OH+])C C[OH2+] [OH3+] [NH3+]CC([O-])=O
NC(N)=[NH2+] NC(=[NH2+])N CC(N)=[NH2+] CN(C)C(=[NH2+])N(C)C [NH2+]=C1NCCCN1 C1CCC2=NCCCN2CC1 C1CCC2=[NH+]CCCN2CC1 C1CN=C2NCCCN2C1 CN(C)P(=NC(C)(C)C)(N(C)C)N(C)C
CN(C)c1ccncc1 C1CN2CCN1CC2 C1N2CN3CN1CN(C2)C3 NN [NH3+]N NO C[NH2+]O CONC CC(=O)NO CC(=NO)C ON=C OO CC(=O)OO CC(C)(C)OOC(C)(C)C OOC
CS SC(C)=O CC(=S)S CC(S)=S [S-]c1ccccc1 Sc1ccccc1 S=C(N)N NC(S)=N [SeH]c1ccccc1 O=[Se]=O C[Se](C)=O C[Te]C S1SC=C1 C1SCCCS1 S1C=CC=CS1 c1ccss1 O=S(Cl)Cl
O=S(O)c1ccccc1 NS(=O)(=O)c1ccccc1 [NH-]S(=O)(=O)C O=S(=O)([N-]S(=O)(=O)C(F)(F)F)C(F)(F)F.[Li+] C[Si](C)(C)[N-][Si](C)(C)C.[K+] C[Si](C)(C)OS(=O)(=O)C(F)(F)F
CCN=C=NCCCN(C)C CN(C)C(On1nnc2cccnc21)=[N+](C)C.F[P-](F)(F)(F)(F)F CN(C)[P+](On1nnc2ccccc21)(N(C)C)N(C)C O=C(Cl)C(=O)Cl CC(C)(C)[O-].[K+] O=C1CCC(=O)N1Br
O=C1c2ccccc2C(=O)N1[O-] O=C1CCCN1 O=C1NC(=O)NC(=O)C1 O=C1NC(=O)C(=O)N1 O=C1NCC(=O)N1 C1CO1 C1CC1 C1CCC1 C12C3C4C1C5C2C3C45 C1C2CC3CC1CC(C2)C3 C1CC2CC1C=C2
CC12CCC3C(CCC4=CC(=O)CCC34C)C1CCC2O CN1CCC23C4OC5=C(O)C=CC(CC1C2C=CC4O)=C35 CC(=O)Oc1ccccc1C(=O)O CC(C)Cc1ccc(cc1)C(C)C(O)=O CN1C(=O)CN=C(c2ccccc2)c2cc(Cl)ccc12
O=C(O)C1=CN(C2CC2)c2cc(N3CCNCC3)c(F)cc2C1=O CC1(C)SC2C(NC(=O)Cc3ccccc3)C(=O)N2C1C(O)=O CN(C)CCCN1c2ccccc2CCc2ccccc21 CCCc1nn(C)c2c1nc([nH]c2=O)-c1cc(ccc1OCC)S(=O)(=O)N1CCN(C)CC1
COc1ccc2nc(S(=O)Cc3ncc(C)c(OC)c3C)[nH]c2c1 Nc1nc(=O)c2ncn(COCCO)c2[nH]1 NC1=NC(=O)c2ncn(COCCO)c2N1 Nc1nc2NCC(CNc3ccc(cc3)C(=O)NC(CCC(O)=O)C(O)=O)Nc2c(=O)[nH]1
C1=CC2=CC3=CC=C(N3)C=C3C=CC(=N3)C=C3C=CC(N3)=CC1=N2 c1cc2cc3ccc(cc4nc(cc5ccc(cc1n2)[nH]5)C=C4)[nH]3 C1=CC=CC=CC=CC=CC=CC=CC=CC=C1 C1=CC2=CC=CC=CC=CC2=CC=C1
c1ccc2c(c1)c1nc3nc(nc4[nH]c(nc5nc(nc2[nH]1)c1ccccc15)c1ccccc41)c1ccccc31 O=C1NC(=O)c2c1c1ccccc1c1[nH]c3ccccc3c21 O=c1c2ccccc2c(=O)c2ccccc12 O=c1c2ccccc2oc2ccccc12
CN1C=CC2=CC=CC=C12 [O-][N+](=O)c1ccc(O)cc1 O=N(=O)c1ccccc1 [O-][N+](=O)c1cc([N+]([O-])=O)c(O)c([N+]([O-])=O)c1 N#[N+]c1ccccc1 [N-]=[N+]=Nc1ccccc1 c1ccc(cc1)N=Nc1ccccc1 C[N+]1=CC=CC=C1
C[C+](C)C [C+](c1ccccc1)(c1ccccc1)c1ccccc1 CC[O+](CC)CC C[I+]c1ccccc1 c1ccc(cc1)[I+]c1ccccc1 C[Cl+]C [Cl-] [F-] [I-] [Br-] F Cl Br I O S N C P B [SiH4] [GeH4] [H+] [H-] [Na] [Na+] [K+] [Mg+2] [Al+3] [Li+].[CH2-]CCC
CC[Mg]CC CC[Zn]Br C=C[Li] [Li]c1ccccc1 [Li]C#C CC(C)[N](C(C)C)[Li] CC(=O)[O-].[Pd+2].[O-]C(C)=O [Fe+2].[cH-]1cccc1.[cH-]1cccc1 C1=CC=C[CH]1 [c]1ccccc1 [n]1ccccc1 [nH2+]1cccc1 c1cc[nH2+]c1
N(=O)(=O)O ON=O [O-]N=O O=[N+]([O-])[O-] O=N[O-] [O-][N+]#N N#N [O-][O+]=O O=O O=[O+][O-] CN(C)N=O NC#N [NH-]C#N N=C=N C=C=C C=C=O C#CC#C CC#CC C=CC=C OC=C NC=C
CCCC(C)(C)C C(C)(C)(C)(C)C CN(C)(C)C C=O=C FC(F)(F)(F)F c1ccccc1(C) CO(C)C C[F]C HCl [HCl] [CH5] [CH4+2] [NH5] [OH4+2] [BH5] [PH5] [SH4] [SH6] [SH5] P(C)(C)(C)(C)(C)C Cl(C)C [ClH2] I(C)(C)C I(C)C B(C)(C)(C)C
[B-](C)(C)(C)C [B+](C)C [C](C)(C)(C)(C)C [N](C)(C)(C)C [N+](C)(C)(C)(C)C [O+](C)(C)(C)C S(C)(C)C S(C)(C)(C)C [P+](C)(C)(C)(C)C [P-](C)(C)(C)(C)(C)C [S-](C)(C)C [Si](C)(C)(C)(C)C [Si-2](F)(F)(F)(F)(F)F [Al-](C)(C)(C)C [Al](C)(C)(C)C
[Se](C)(C)(C)C [As](C)(C)(C)(C)C [Sb-](F)(F)(F)(F)(F)F [As-](F)(F)(F)(F)(F)F [Bi](C)(C)C [Ge](C)(C)(C)C [Ga](C)(C)C [In](C)(C)C [Tl](C)C [Pb](C)(C)(C)C [Ca+2] [Ca](O)O C[Be]C [Zn+2] [I-](I)I [Br-](Br)Br I[I-]I [ClH+]C [Cl+](C)C
C1=CC=CC=C1C2=CC=CN2 C1=COC=C1C(=O)O C1=CN=CN1 C1=CC(=CC=C1)O CC1=CC=CC=C1N c1ccc2c(c1)[nH]c(=O)[nH]2 O=c1[nH]c2ccccc2[nH]1 O=C1Nc2ccccc2N1 c1cc(=O)c2ccccc2[nH]1 O=c1cc(-c2ccccc2)oc2ccccc12 Cc1cc(=O)n(-c2ccccc2)n1C
O=C1C=CNC=C1 O=C1N=CNc2[nH]ncc12 O=c1nc[nH]c2[nH]ncc12 S=c1nc[nH]c2nc[nH]c12 Oc1nc(O)nc(O)n1 O=c1[nH]c(=O)[nH]c(=O)[nH]1 Nc1nc(N)nc(N)n1 N=c1[nH]c(=N)[nH]c(=N)[nH]1 O=c1on[n-]c1 [O-]c1on[n+](C)c1 [n-]1nnnc1C c1c[nH]c(=[NH2+])s1
`
  .trim()
  .split(/\s+/);

const SIGNS = 'CNOSPFBcnosp[]()=#:123%+-@HClBrI.';

/** A small seeded generator, so that a failing change can be met again. */
export function randomFrom(seed: number): () => number {
  let state = seed;
  return () => {
    state = (Math.imul(state, 1664525) + 1013904223) >>> 0;
    return state / 2 ** 32;
  };
}

/** Changes of the structures above: a sign dropped, added or replaced, or two structures joined. */
export function changedStructures(count: number, seed: number): string[] {
  const random = randomFrom(seed);
  const below = (limit: number) => Math.floor(random() * limit);
  return Array.from({ length: count }, (_, run) => {
    let text = STRUCTURES[run % STRUCTURES.length]!;
    if (random() < 0.25) text += STRUCTURES[below(STRUCTURES.length)]!;
    for (let change = below(3); 0 < change; change--) {
      const at = below(text.length + 1);
      const kind = random();
      const sign = kind < 0.35 ? '' : SIGNS[below(SIGNS.length)]!;
      text = text.slice(0, at) + sign + text.slice(kind < 0.7 && sign !== '' ? at : at + 1);
    }
    return text;
  });
}

/** A grid of carbon atoms joined to their neighbours: as many four-membered rings as it has fields. */
export function grid(rows: number, columns: number): Structure {
  const atoms = Array.from({ length: rows * columns }, (_, index) => ({
    index,
    element: 'C',
    aromatic: false,
    isotope: 0,
    charge: 0,
    writtenHydrogens: undefined,
    mapNumber: 0,
    span: { start: index, end: index + 1 },
  }));
  const bond = (from: number, to: number) => ({ from, to, symbol: undefined, span: { start: 0, end: 0 } });
  const bonds = atoms.flatMap(({ index }) => [
    ...((index + 1) % columns === 0 ? [] : [bond(index, index + 1)]),
    ...(index + columns < atoms.length ? [bond(index, index + columns)] : []),
  ]);
  return { atoms, bonds };
}
