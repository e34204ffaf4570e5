/** Nearest items in a metric space, found without looking at all of them, while items keep coming. */

/** Items that wait to be put into a tree, and are looked at one by one. */
const WAITING = 32;
/** What rounding may take from the triangle inequality, as a share of the distances. */
const ROUNDING = 1e-12;

/** Each item stands for those behind it: the nearer half of them, up to `radius`, comes first. */
interface Tree {
  items: Int32Array;
  radius: Float64Array;
}

export interface VantageForest {
  add(item: number): void;
  /** Calls back with items, each with its distance, until all that are within the answer of the last call (at first `within`) have been seen. */
  search(
    distanceTo: (item: number) => number,
    within: number,
    found: (item: number, distance: number) => number,
  ): void;
}

/**
 * Vantage-point trees (Yianilos, SODA 1993) of sizes 2^k·32, of which two of a size are made into one of the next (Bentley & Saxe, J. Algorithms 1, 301,
 * 1980): an item is put in order O(log² n) times, and nothing is ever rebuilt as a whole but rarely.
 *
 * @param distance a metric between items, whole numbers from 0
 */
export function vantageForest(distance: (a: number, b: number) => number): VantageForest {
  const trees: (Tree | undefined)[] = [];
  let waiting: number[] = [];
  return {
    add(item) {
      waiting.push(item);
      if (waiting.length < WAITING) return;
      let items = waiting;
      waiting = [];
      let level = 0;
      for (let other = trees[level]; other; other = trees[++level]) {
        items = [...other.items, ...items];
        trees[level] = undefined;
      }
      trees[level] = grown(items, distance);
    },
    search(distanceTo, within, found) {
      let reach = within;
      const look = (item: number): number => {
        const d = distanceTo(item);
        if (d <= reach) reach = found(item, d);
        return d;
      };
      for (const item of waiting) look(item);
      for (const tree of trees) if (tree) visit(tree, 0, tree.items.length);

      function visit({ items, radius }: Tree, from: number, to: number): void {
        if (from >= to) return;
        const d = look(items[from]);
        const middle = middleOf(from, to);
        const r = radius[from];
        const slack = ROUNDING * (d + r);
        const inner = () => d - r <= reach + slack && visit(tree, from + 1, middle);
        const outer = () => r - d <= reach + slack && visit(tree, middle, to);
        const tree = { items, radius };
        if (d < r) {
          inner();
          outer();
        } else {
          outer();
          inner();
        }
      }
    },
  };
}

/** Where the further half of the items behind the first begins. */
const middleOf = (from: number, to: number): number => from + 1 + ((to - from) >> 1);

function grown(list: readonly number[], distance: (a: number, b: number) => number): Tree {
  const items = Int32Array.from(list);
  const radius = new Float64Array(items.length);
  grow(0, items.length);
  return { items, radius };

  function grow(from: number, to: number): void {
    if (to - from < 2) return;
    const behind = Array.from(items.subarray(from + 1, to), (item) => ({
      item,
      d: distance(items[from], item),
    }));
    behind.sort((a, b) => a.d - b.d || a.item - b.item);
    behind.forEach(({ item }, i) => {
      items[from + 1 + i] = item;
    });
    const middle = middleOf(from, to);
    radius[from] = behind[middle - from - 2].d;
    grow(from + 1, middle);
    grow(middle, to);
  }
}
