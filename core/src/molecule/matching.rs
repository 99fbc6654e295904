//! Maximum matching in a general graph: as many disjoint pairs of neighbours as there can be.
//!
//! Augmenting paths are grown breadth first from each free vertex; an odd cycle met on the way (a blossom, as the
//! five-membered rings of a fullerene make) is contracted to its base. Time at most `A` searches of `A` contractions of
//! `A` vertices each; in practice nearly linear, since a greedy start leaves few vertices free.
//!
//! # Source
//! `edmonds-1965`.

use heapless::Vec;

/// Stands for "no vertex".
const NONE: u16 = u16::MAX;

/// A vertex for each of at most `A` vertices. Reading past the end gives [`NONE`], writing there does nothing.
struct Links<const A: usize>([u16; A]);

impl<const A: usize> Links<A> {
    const fn empty() -> Self {
        Self([NONE; A])
    }

    fn get(&self, vertex: u16) -> u16 {
        self.0.get(usize::from(vertex)).copied().unwrap_or(NONE)
    }

    fn set(&mut self, vertex: u16, link: u16) {
        if let Some(slot) = self.0.get_mut(usize::from(vertex)) {
            *slot = link;
        }
    }
}

/// A matching on the vertices `0..A`.
pub(super) struct Matching<const A: usize> {
    partner: Links<A>,
}

impl<const A: usize> Matching<A> {
    /// A maximum matching of the graph in which `adjacent(v)` gives the neighbours of each of the `vertices`.
    ///
    /// The relation must be symmetric and name only members of `vertices`.
    pub(super) fn maximum<I: Iterator<Item = u16>>(
        vertices: impl Iterator<Item = u16> + Clone,
        adjacent: impl Fn(u16) -> I,
    ) -> Self {
        let mut matching = Self {
            partner: Links::empty(),
        };
        for v in vertices.clone() {
            let free = |&w: &u16| matching.partner(w).is_none();
            if matching.partner(v).is_none()
                && let Some(w) = adjacent(v).find(free)
            {
                matching.pair(v, w);
            }
        }
        for root in vertices {
            if matching.partner(root).is_none() {
                matching.augment(root, &adjacent);
            }
        }
        matching
    }

    /// The vertex that `vertex` is paired with.
    pub(super) fn partner(&self, vertex: u16) -> Option<u16> {
        Some(self.partner.get(vertex)).filter(|&w| w != NONE)
    }

    fn pair(&mut self, v: u16, w: u16) {
        self.partner.set(v, w);
        self.partner.set(w, v);
    }

    fn augment<I: Iterator<Item = u16>>(&mut self, root: u16, adjacent: &impl Fn(u16) -> I) {
        let mut search = Search::new(root);
        let mut end = search.grow(root, &self.partner, adjacent);
        while let Some(v) = end {
            let before = search.parent.get(v);
            let next = self.partner(before);
            self.pair(v, before);
            end = next;
        }
    }
}

/// A forest of alternating paths from one free vertex.
struct Search<const A: usize> {
    /// The vertex before an inner vertex on its path.
    parent: Links<A>,
    /// The base of the blossom that a vertex has been contracted into.
    base: Links<A>,
    /// Whether a vertex is an outer one, at even distance from the root.
    outer: [bool; A],
    /// Outer vertices in the order of discovery.
    queue: Vec<u16, A>,
}

impl<const A: usize> Search<A> {
    fn new(root: u16) -> Self {
        let mut base = Links::empty();
        for (vertex, slot) in (0..NONE).zip(&mut base.0) {
            *slot = vertex;
        }
        let mut search = Self {
            parent: Links::empty(),
            base,
            outer: [false; A],
            queue: Vec::new(),
        };
        search.reach(root);
        search
    }

    /// Grows the forest until it meets a free vertex, the end of an augmenting path.
    fn grow<I: Iterator<Item = u16>>(
        &mut self,
        root: u16,
        partner: &Links<A>,
        adjacent: &impl Fn(u16) -> I,
    ) -> Option<u16> {
        let mut head = 0;
        while let Some(&v) = self.queue.get(head) {
            head += 1;
            for w in adjacent(v) {
                if self.base.get(v) == self.base.get(w) || partner.get(v) == w {
                    continue;
                }
                let mate = partner.get(w);
                if w == root || (mate != NONE && self.parent.get(mate) != NONE) {
                    self.contract(v, w, partner);
                } else if self.parent.get(w) == NONE {
                    self.parent.set(w, v);
                    if mate == NONE {
                        return Some(w);
                    }
                    self.reach(mate);
                }
            }
        }
        None
    }

    /// Makes `vertex` an outer one. The queue cannot overflow: a vertex enters it once.
    fn reach(&mut self, vertex: u16) {
        if let Some(outer) = self.outer.get_mut(usize::from(vertex))
            && !*outer
        {
            *outer = true;
            let _ = self.queue.push(vertex);
        }
    }

    /// Contracts the odd cycle that the edge between the outer vertices `v` and `w` closes.
    fn contract(&mut self, v: u16, w: u16, partner: &Links<A>) {
        let base = self.common_base(v, w, partner);
        let mut blossom = [false; A];
        self.mark(v, base, w, partner, &mut blossom);
        self.mark(w, base, v, partner, &mut blossom);
        for vertex in (0..NONE).take(A) {
            let inside = blossom.get(usize::from(self.base.get(vertex)));
            if inside == Some(&true) {
                self.base.set(vertex, base);
                self.reach(vertex);
            }
        }
    }

    /// The nearest base that the paths from `v` and from `w` to the root share.
    fn common_base(&self, v: u16, w: u16, partner: &Links<A>) -> u16 {
        let mut on_path = [false; A];
        let mut vertex = v;
        loop {
            vertex = self.base.get(vertex);
            match on_path.get_mut(usize::from(vertex)) {
                Some(seen) => *seen = true,
                None => break,
            }
            vertex = self.parent.get(partner.get(vertex));
        }
        vertex = self.base.get(w);
        while let Some(false) = on_path.get(usize::from(vertex)) {
            vertex = self.base.get(self.parent.get(partner.get(vertex)));
        }
        vertex
    }

    /// Marks the bases from `v` down to `base` and gives their vertices the way back over `child`.
    fn mark(
        &mut self,
        mut v: u16,
        base: u16,
        mut child: u16,
        partner: &Links<A>,
        blossom: &mut [bool; A],
    ) {
        while v != NONE && self.base.get(v) != base {
            let mate = partner.get(v);
            for vertex in [v, mate] {
                if let Some(inside) = blossom.get_mut(usize::from(self.base.get(vertex))) {
                    *inside = true;
                }
            }
            self.parent.set(v, child);
            child = mate;
            v = self.parent.get(mate);
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    /// How many pairs `edges` allow, by trying all subsets.
    fn most_pairs(edges: &[(u16, u16)]) -> u32 {
        (0_u32..1 << edges.len())
            .filter(|subset| {
                let mut used = 0_u32;
                edges.iter().enumerate().all(|(i, &(a, b))| {
                    let both = 1 << a | 1 << b;
                    let chosen = subset >> i & 1 == 1;
                    let free = used & both == 0;
                    used |= if chosen { both } else { 0 };
                    !chosen || free
                })
            })
            .map(u32::count_ones)
            .max()
            .unwrap_or(0)
    }

    #[test]
    fn as_many_pairs_as_exhaustive_search_finds() {
        let mut state = 0x9E37_79B9_7F4A_7C15_u64;
        let mut random = |below: u64| {
            state ^= state << 13;
            state ^= state >> 7;
            state ^= state << 17;
            (state % below) as u16
        };
        for round in 0..2000 {
            let n = 4 + round % 7;
            let mut edges: Vec<(u16, u16), 13> = Vec::new();
            for _ in 0..13 {
                let (a, b) = (random(n), random(n));
                if a != b && !edges.contains(&(a, b)) && !edges.contains(&(b, a)) {
                    edges.push((a, b)).unwrap();
                }
            }
            let adjacent = |v: u16| {
                edges.iter().filter_map(move |&(a, b)| match v {
                    _ if a == v => Some(b),
                    _ if b == v => Some(a),
                    _ => None,
                })
            };
            let matching = Matching::<10>::maximum(0..n as u16, adjacent);
            let mut matched = 0;
            for v in 0..n as u16 {
                if let Some(w) = matching.partner(v) {
                    assert_eq!(matching.partner(w), Some(v));
                    assert!(adjacent(v).any(|x| x == w), "{v}-{w} is no edge");
                    matched += 1;
                }
            }
            assert_eq!(matched, 2 * most_pairs(&edges), "{edges:?}");
        }
    }
}
