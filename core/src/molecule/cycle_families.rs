//! Families of cycles that differ only in which shortest paths they take.
//!
//! The highest vertex of a cycle is its root. From the root two shortest paths run to the far end, which is a bond (odd
//! cycle) or a vertex (even cycle). All choices of shortest paths make a family; either all of its cycles are relevant or
//! none is, since two of them differ by sums of shorter cycles.
//!
//! # Source
//! `vismara-1997`. Paths are kept below the root, which finds a superset of the paper's families; the surplus is never
//! relevant.

use heapless::Vec;

use super::cycle_space::CyclicGraph;

const UNREACHED: u16 = u16::MAX;

/// All cycles with one root and one far end.
#[derive(Clone, Copy)]
pub(super) struct Family {
    /// Where the two paths to the root start.
    starts: [u16; 2],
    /// The far vertex of an even cycle, next to both starts.
    apex: Option<u16>,
}

/// The shortest paths from a root through vertices below it.
pub(super) struct ShortestPaths<'graph, const B: usize> {
    graph: &'graph CyclicGraph<B>,
    distances: [u16; B],
    /// By distance, the root first.
    reached: Vec<u16, B>,
}

impl<'graph, const B: usize> ShortestPaths<'graph, B> {
    /// Breadth-first search from `root` among the vertices that are not above it.
    pub(super) fn below(graph: &'graph CyclicGraph<B>, root: u16) -> Self {
        let mut paths = Self {
            graph,
            distances: [UNREACHED; B],
            reached: Vec::new(),
        };
        paths.reach(root, 0);
        let mut next = 0;
        while let Some(&vertex) = paths.reached.get(next) {
            next += 1;
            let distance = paths.distance(vertex) + 1;
            for link in graph.links(vertex) {
                if link.vertex < root && paths.distance(link.vertex) == UNREACHED {
                    paths.reach(link.vertex, distance);
                }
            }
        }
        paths
    }

    /// The families with this root, whether their cycles are relevant or not.
    pub(super) fn families(&self) -> impl Iterator<Item = Family> {
        self.reached.iter().flat_map(move |&far| {
            let even = self.nearer(far).enumerate().flat_map(move |(i, first)| {
                self.nearer(far).skip(i + 1).map(move |second| Family {
                    starts: [first, second],
                    apex: Some(far),
                })
            });
            let odd = self.graph.links(far).iter().filter_map(move |link| {
                let level = self.distance(link.vertex) == self.distance(far);
                (level && link.vertex < far).then_some(Family {
                    starts: [far, link.vertex],
                    apex: None,
                })
            });
            even.chain(odd)
        })
    }

    /// How many vertices the cycles of a family have.
    pub(super) fn size(&self, family: Family) -> usize {
        let [start, _] = family.starts;
        2 * usize::from(self.distance(start)) + 1 + usize::from(family.apex.is_some())
    }

    /// One cycle of a family as its vertices in ring order; `None` when its paths meet before the root, and then no cycle
    /// of the family is relevant.
    pub(super) fn prototype(&self, family: Family) -> Option<Vec<u16, B>> {
        let [first, second] = family.starts.map(|start| self.first_path(start));
        // Both paths lose one in distance per step, so they can only meet at the same step.
        let meetings = first.iter().zip(&second).filter(|(a, b)| a == b).count();
        (meetings == 1).then(|| closed(&first, &second, family.apex))
    }

    /// Calls `visit` with every cycle of a relevant family, each as its vertices in ring order.
    ///
    /// # Errors
    /// The first error of `visit`, which ends the enumeration.
    pub(super) fn for_each_cycle<E>(
        &self,
        family: Family,
        mut visit: impl FnMut(&[u16]) -> Result<(), E>,
    ) -> Result<(), E> {
        let [start, other_start] = family.starts;
        let mut path = self.first_path(start);
        loop {
            let mut other = self.first_path(other_start);
            loop {
                visit(&closed::<B>(&path, &other, family.apex))?;
                if !self.advance(&mut other) {
                    break;
                }
            }
            if !self.advance(&mut path) {
                return Ok(());
            }
        }
    }

    fn distance(&self, vertex: u16) -> u16 {
        self.distances
            .get(usize::from(vertex))
            .copied()
            .unwrap_or(UNREACHED)
    }

    fn reach(&mut self, vertex: u16, distance: u16) {
        if let Some(slot) = self.distances.get_mut(usize::from(vertex)) {
            *slot = distance;
            // There is a place for every vertex.
            let _ = self.reached.push(vertex);
        }
    }

    /// The neighbours of a vertex that lie one step nearer to the root.
    fn nearer(&self, vertex: u16) -> impl Iterator<Item = u16> {
        let distance = self.distance(vertex);
        self.graph
            .links(vertex)
            .iter()
            .map(|link| link.vertex)
            .filter(move |&v| self.distance(v).checked_add(1) == Some(distance))
    }

    fn first_path(&self, start: u16) -> Vec<u16, B> {
        let mut path = Vec::new();
        let _ = path.push(start);
        self.complete(&mut path);
        path
    }

    /// Runs a path on to the root by the first neighbour each time.
    fn complete(&self, path: &mut Vec<u16, B>) {
        while let Some(next) = path.last().and_then(|&v| self.nearer(v).next()) {
            if path.push(next).is_err() {
                break;
            }
        }
    }

    /// Replaces a path by the next one with the same start; `false` after the last.
    fn advance(&self, path: &mut Vec<u16, B>) -> bool {
        while let Some(old) = path.pop() {
            let Some(&before) = path.last() else {
                break;
            };
            let other = self.nearer(before).skip_while(|&v| v != old).nth(1);
            if let Some(other) = other {
                let _ = path.push(other);
                self.complete(path);
                return true;
            }
        }
        false
    }
}

/// The cycle of two paths that end in the same root.
fn closed<const B: usize>(first: &[u16], second: &[u16], apex: Option<u16>) -> Vec<u16, B> {
    let back = second.iter().rev().skip(1);
    // Vertices of a cycle are distinct, and there are at most `B` of them.
    first
        .iter()
        .chain(back)
        .copied()
        .chain(apex)
        .take(B)
        .collect()
}
