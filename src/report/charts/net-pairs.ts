/** The pair maps of a subject: one for each net among its sources, alike ones (other randomisations of one net) once. */
import type { NetPairs, PairShare, Sensitivity, Share } from "../../record/sensitivity.js";
import type { Subject, View } from "../view.js";
import type { Chart } from "./chart.js";
import { MATTERS, pairMap, type PairPoint } from "./pair-map.js";

/** Maps of one subject at most; the record holds all. */
const MOST = 3;

/** As the map itself has it. */
const matters = ({ value, interval: [low] }: Share): boolean => value >= MATTERS && low > 0;

export function netPairCharts(view: View, subject: Subject): Chart[] {
  const { sensitivity } = subject;
  // where no pair does anything together there is nothing to see
  const { pairs = [] } = sensitivity?.measures ?? {};
  if (sensitivity === null || !pairs.some(({ interaction }) => matters(interaction))) return [];
  const seen = new Set<string>();
  const distinct = sensitivity.nets.filter(({ base, digits, t }) => {
    const key = [base, digits, ...t].join();
    if (seen.has(key)) return false;
    return seen.add(key);
  });
  return distinct.slice(0, MOST).flatMap((net) => {
    const slug = view.sources.find(({ source }) => source.id === net.source)?.slug ?? "net";
    const { source, base, digits } = net;
    const chart = pairMap({
      slug: `${subject.slug}-${slug}`,
      source,
      problem: subject.title,
      base,
      digits,
      pairs: pointsOf(sensitivity, net),
    });
    return chart === null ? [] : [{ ...chart, notDrawn: [...chart.notDrawn, ...leftOut(sensitivity)] }];
  });
}

function pointsOf({ measures, confidence }: Sensitivity, { t }: NetPairs): PairPoint[] {
  if (measures === null) return [];
  const label = (k: number): string => measures.units[k]?.label ?? "";
  return measures.pairs.flatMap(({ i, j, interaction }: PairShare, k): PairPoint[] => {
    const value = t[k];
    if (value === undefined) return [];
    const [low, high] = interaction.interval;
    return [
      {
        indices: [i, j],
        names: [label(i), label(j)],
        t: value,
        dependence: interaction.value,
        interval: { low, high, level: confidence },
      },
    ];
  });
}

function leftOut({ measures }: Sensitivity): string[] {
  if (measures === null || measures.allPairs !== null) return [];
  return ["Only pairs of the coordinates that do most together with others were looked at."];
}
