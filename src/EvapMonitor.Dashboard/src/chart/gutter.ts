/** Places labels beside the plot: each as near to its own height as it can be, none over another, all inside. Heights in px from the top. */
export function place(wanted: readonly number[], height: number, top: number, bottom: number): number[] {
  const order = wanted.map((_, i) => i).sort((a, b) => wanted[a]! - wanted[b]!);
  const at = order.map(i => wanted[i]!);
  // Groups of labels that touch move as one about their mean until no two groups touch.
  let groups = at.map(y => ({ wanted: [y], centre: y }));
  const clamp = (g: { wanted: number[]; centre: number }) => {
    const half = ((g.wanted.length - 1) * height) / 2;
    g.centre = Math.max(top + half, Math.min(bottom - half, g.centre));
  };
  for (let touching = true; touching;) {
    touching = false;
    groups.forEach(clamp);
    for (let i = 1; i < groups.length; i++) {
      const a = groups[i - 1]!, b = groups[i]!;
      const room = ((a.wanted.length + b.wanted.length) * height) / 2;
      if (b.centre - a.centre >= room - 1e-6) continue;
      const all = [...a.wanted, ...b.wanted];
      // Each label stands at its offset in the group, so the best centre is the mean of what each wants of it.
      const centre = all.reduce((sum, y, k) => sum + y - (k - (all.length - 1) / 2) * height, 0) / all.length;
      groups = [...groups.slice(0, i - 1), { wanted: all, centre }, ...groups.slice(i + 1)];
      touching = true;
      break;
    }
  }
  const placed: number[] = [];
  for (const g of groups) g.wanted.forEach((_, k) => placed.push(g.centre + (k - (g.wanted.length - 1) / 2) * height));
  const result: number[] = [];
  order.forEach((original, k) => { result[original] = placed[k]!; });
  return result;
}
