//! Labels and their hosts settled together: the assignment of least total cost, found by chains of displacement.
//!
//! A label goes to one host or to none. A pairing has a cost of its own, and a host's labels have a cost together
//! (two heights at one place, two highs in a row, ...). From a first assignment, each label looks for a better home: it
//! may displace a label there, which looks for another home in turn, and so on; the cheapest such chain (found layer by
//! layer, as in Bellman and Ford's method) is taken if the total falls. Nothing depends on the order of the labels but
//! the choice among exact equals.

use std::cell::Cell;
use std::collections::BTreeMap;

/// A label and a host that it may belong to.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct Pairing {
    pub(super) label: usize,
    pub(super) host: usize,
    /// Order among the host's labels, metres.
    pub(super) station_m: f64,
}

/// What pairings cost.
pub(super) trait Stakes {
    /// Cost of a pairing by itself.
    fn own(&self, pairing: usize) -> f64;
    /// Cost of a host's pairings together, given in order of station.
    fn shared(&self, host: usize, pairings: impl Iterator<Item = usize> + Clone) -> f64;
    /// Labels of one host farther apart along it than this leave one another in peace, metres.
    fn apart_m(&self) -> f64;
}

/// Cost of a label that goes to nobody.
pub(super) const UNCLAIMED: f64 = 6.0;
/// Longest chain of displacements.
const DEPTH: usize = 24;
/// Labels looked at in one search.
const BREADTH: usize = 600;
/// Gains below this are rounding.
const GAIN: f64 = 1e-6;
/// Rounds over all labels.
const ROUNDS: usize = 12;

/// An assignment and what it was made from.
pub(super) struct Settlement<'a, S: Stakes> {
    pairings: &'a [Pairing],
    stakes: &'a S,
    /// Pairings of each label.
    choices: Vec<Vec<usize>>,
    /// Pairings that each host holds, in order of station.
    held: Vec<Vec<usize>>,
    /// What these cost each host together, once it has been asked for.
    standing: Vec<Cell<Option<f64>>>,
    /// Pairing that each label has taken.
    taken: Vec<Option<usize>>,
}

/// What a chain costs, and each label in it with the pairing that it takes.
pub(super) type Chain = (f64, Vec<(usize, Option<usize>)>);

/// A label without a home in a search, and how it came to be so.
struct Homeless {
    label: usize,
    cost: f64,
    parent: usize,
    /// Pairing of the parent's label that displaced this one.
    by: usize,
}

/// A way for the last homeless label of a chain to come to rest.
#[derive(Clone, Copy)]
struct Rest {
    cost: f64,
    node: usize,
    pairing: Option<usize>,
}

impl<'a, S: Stakes> Settlement<'a, S> {
    /// Starts from an earlier assignment; labels that have none take what is cheapest and free.
    pub(super) fn new(
        pairings: &'a [Pairing],
        labels: usize,
        hosts: usize,
        stakes: &'a S,
        before: &[Option<usize>],
    ) -> Self {
        let mut choices = vec![Vec::new(); labels];
        for (at, pairing) in pairings.iter().enumerate() {
            choices[pairing.label].push(at);
        }
        let mut settlement = Self {
            pairings,
            stakes,
            choices,
            held: vec![Vec::new(); hosts],
            standing: vec![Cell::new(None); hosts],
            taken: vec![None; labels],
        };
        for &pairing in before.iter().flatten() {
            settlement.put(pairing);
        }
        settlement.fill();
        settlement
    }

    /// Improves until nothing gets cheaper; returns each label's pairing.
    pub(super) fn settle(&mut self) -> Vec<Option<usize>> {
        for _ in 0..ROUNDS {
            let mut better = false;
            for label in 0..self.taken.len() {
                if !self.content(label) {
                    better |= self.improve(label);
                }
            }
            if !better {
                break;
            }
        }
        self.taken.clone()
    }

    /// The cheapest assignment in which a label is elsewhere than it is now, and by how much it costs more; `None` where
    /// it costs more by over `margin`.
    pub(super) fn second_best(&mut self, label: usize, margin: f64) -> Option<Chain> {
        let now = self.taken[label]?;
        let banned = self.pairings[now].host;
        let before = self.remove(label);
        let found = self.search(label, Some(banned), before + margin);
        self.put(now);
        found
            .into_iter()
            .filter_map(|(_, changes)| {
                let more = self.try_changes(&changes, f64::NEG_INFINITY)?;
                (more <= margin).then_some((more, changes))
            })
            .min_by(|a, b| a.0.total_cmp(&b.0))
    }

    /// By how much more the whole costs with these changes.
    pub(super) fn cost_of_changes(&mut self, changes: &[(usize, Option<usize>)]) -> f64 {
        self.try_changes(changes, f64::NEG_INFINITY).unwrap_or(0.0)
    }

    /// Takes a label from its host for good.
    pub(super) fn release(&mut self, label: usize) {
        if self.taken[label].is_some() {
            self.remove(label);
        }
    }

    /// Each label's pairing.
    pub(super) fn taken(&self) -> &[Option<usize>] {
        &self.taken
    }

    /// Pairings that a label may choose from.
    pub(super) fn choices(&self, label: usize) -> &[usize] {
        self.choices.get(label).map_or(&[], Vec::as_slice)
    }

    /// Unclaimed labels take what is free, cheapest first.
    fn fill(&mut self) {
        let mut order: Vec<(f64, usize)> = (0..self.pairings.len())
            .map(|pairing| (self.stakes.own(pairing), pairing))
            .collect();
        order.sort_by(|a, b| a.0.total_cmp(&b.0).then(a.1.cmp(&b.1)));
        for (own, pairing) in order {
            let Pairing { label, host, .. } = self.pairings[pairing];
            if self.taken[label].is_none() && own + self.entering(host, pairing, None) < UNCLAIMED {
                self.put(pairing);
            }
        }
    }

    /// Whether a label has its cheapest pairing and is in nobody's way.
    fn content(&self, label: usize) -> bool {
        let Some(taken) = self.taken[label] else {
            return self.choices[label].is_empty();
        };
        let own = self.stakes.own(taken);
        let cheapest = self.choices[label]
            .iter()
            .all(|&other| self.stakes.own(other) >= own - GAIN);
        cheapest && self.leaving(taken) > -0.1
    }

    /// What a host's pairings cost together.
    fn standing(&self, host: usize) -> f64 {
        let known = &self.standing[host];
        known.get().unwrap_or_else(|| {
            let cost = self.stakes.shared(host, self.held[host].iter().copied());
            known.set(Some(cost));
            cost
        })
    }

    /// Change of a host's cost when a pairing leaves.
    fn leaving(&self, pairing: usize) -> f64 {
        let host = self.pairings[pairing].host;
        let without = self.held[host].iter().copied().filter(|&p| p != pairing);
        self.stakes.shared(host, without) - self.standing(host)
    }

    /// Change of a host's cost when a pairing enters and another leaves.
    fn entering(&self, host: usize, pairing: usize, out: Option<usize>) -> f64 {
        let held = &self.held[host];
        let (before, behind) = held.split_at(self.slot(held, pairing));
        let stays = |&p: &usize| Some(p) != out;
        let before = before.iter().copied().filter(stays);
        let behind = behind.iter().copied().filter(stays);
        let with = before.chain(std::iter::once(pairing)).chain(behind);
        self.stakes.shared(host, with) - self.standing(host)
    }

    fn slot(&self, held: &[usize], pairing: usize) -> usize {
        let station_m = self.pairings[pairing].station_m;
        held.partition_point(|&p| {
            let other_m = self.pairings[p].station_m;
            other_m < station_m || (other_m <= station_m && p < pairing)
        })
    }

    fn put(&mut self, pairing: usize) {
        let Pairing { label, host, .. } = self.pairings[pairing];
        let at = self.slot(&self.held[host], pairing);
        self.held[host].insert(at, pairing);
        self.standing[host].set(None);
        self.taken[label] = Some(pairing);
    }

    /// Takes a label out; returns the cost that went with it.
    fn remove(&mut self, label: usize) -> f64 {
        let Some(pairing) = self.taken[label].take() else {
            return UNCLAIMED;
        };
        let host = self.pairings[pairing].host;
        let before = self.standing(host);
        self.held[host].retain(|&p| p != pairing);
        self.standing[host].set(None);
        before - self.standing(host) + self.stakes.own(pairing)
    }

    fn improve(&mut self, label: usize) -> bool {
        let now = self.taken[label];
        let before = self.remove(label);
        let found = self.search(label, None, before);
        if let Some(pairing) = now {
            self.put(pairing);
        }
        found
            .iter()
            .take(4)
            .any(|(_, changes)| self.try_changes(changes, -GAIN).is_some())
    }

    /// Chains that start with a homeless label and cost less than `below`, cheapest first.
    fn search(&self, label: usize, banned: Option<usize>, below: f64) -> Vec<Chain> {
        let mut nodes = vec![Homeless {
            label,
            cost: 0.0,
            parent: usize::MAX,
            by: usize::MAX,
        }];
        let mut cheapest: BTreeMap<usize, f64> = BTreeMap::new();
        let mut rests: Vec<Rest> = Vec::new();
        let mut layer = 0..1;
        for _ in 0..DEPTH {
            for node in layer.clone() {
                self.spread(node, &mut nodes, banned, below, &mut cheapest, &mut rests);
            }
            layer = layer.end..nodes.len();
            if layer.is_empty() || nodes.len() > BREADTH {
                break;
            }
        }
        rests.sort_by(|a, b| a.cost.total_cmp(&b.cost).then(a.node.cmp(&b.node)));
        rests.truncate(6);
        let changes = |rest: &Rest| {
            let mut changes = vec![(nodes[rest.node].label, rest.pairing)];
            let mut node = rest.node;
            while let Some(homeless) = nodes.get(node).filter(|h| h.parent != usize::MAX) {
                node = homeless.parent;
                changes.push((nodes[node].label, Some(homeless.by)));
            }
            (rest.cost, changes)
        };
        rests.iter().map(changes).collect()
    }

    /// Looks for homes for one homeless label: free ones, and ones that another has to leave.
    fn spread(
        &self,
        node: usize,
        nodes: &mut Vec<Homeless>,
        banned: Option<usize>,
        below: f64,
        cheapest: &mut BTreeMap<usize, f64>,
        rests: &mut Vec<Rest>,
    ) {
        let Homeless { label, cost, .. } = nodes[node];
        if cost + UNCLAIMED < below {
            rests.push(Rest {
                cost: cost + UNCLAIMED,
                node,
                pairing: None,
            });
        }
        for &pairing in &self.choices[label] {
            let Pairing {
                host, station_m, ..
            } = self.pairings[pairing];
            if Some(pairing) == self.taken[label] || (node == 0 && banned == Some(host)) {
                continue;
            }
            let own = self.stakes.own(pairing);
            let free = cost + own + self.entering(host, pairing, None);
            if free < below {
                rests.push(Rest {
                    cost: free,
                    node,
                    pairing: Some(pairing),
                });
            }
            for &other in &self.held[host] {
                let Pairing {
                    label: out,
                    station_m: other_m,
                    ..
                } = self.pairings[other];
                if (other_m - station_m).abs() > self.stakes.apart_m()
                    || on_the_way(nodes, node, out)
                {
                    continue;
                }
                let next =
                    cost + own + self.entering(host, pairing, Some(other)) - self.stakes.own(other);
                let held = cheapest.get(&out).copied().unwrap_or(f64::INFINITY);
                if next < below + 0.5 && next < held - GAIN && nodes.len() < BREADTH {
                    cheapest.insert(out, next);
                    nodes.push(Homeless {
                        label: out,
                        cost: next,
                        parent: node,
                        by: pairing,
                    });
                }
            }
        }
    }

    /// Makes the changes if the total cost changes by less than `below` (or always, to be undone, where it is infinite).
    fn try_changes(&mut self, changes: &[(usize, Option<usize>)], below: f64) -> Option<f64> {
        let before: Vec<(usize, Option<usize>)> = changes
            .iter()
            .map(|&(label, _)| (label, self.taken[label]))
            .collect();
        let mut hosts: Vec<usize> = before
            .iter()
            .chain(changes)
            .filter_map(|&(_, pairing)| Some(self.pairings[pairing?].host))
            .collect();
        hosts.sort_unstable();
        hosts.dedup();
        let cost_before = self.cost_of(&hosts, &before);
        self.make(changes);
        let more = self.cost_of(&hosts, changes) - cost_before;
        if below == f64::NEG_INFINITY {
            self.make(&before);
            return Some(more);
        }
        if more < below {
            return Some(more);
        }
        self.make(&before);
        None
    }

    fn make(&mut self, changes: &[(usize, Option<usize>)]) {
        for &(label, _) in changes {
            if let Some(pairing) = self.taken[label].take() {
                let host = self.pairings[pairing].host;
                self.held[host].retain(|&p| p != pairing);
                self.standing[host].set(None);
            }
        }
        for pairing in changes.iter().filter_map(|&(_, pairing)| pairing) {
            self.put(pairing);
        }
    }

    fn cost_of(&self, hosts: &[usize], labels: &[(usize, Option<usize>)]) -> f64 {
        let shared: f64 = hosts.iter().map(|&host| self.standing(host)).sum();
        let own: f64 = labels
            .iter()
            .map(|&(_, pairing)| pairing.map_or(UNCLAIMED, |p| self.stakes.own(p)))
            .sum();
        shared + own
    }
}

fn on_the_way(nodes: &[Homeless], mut node: usize, label: usize) -> bool {
    while let Some(homeless) = nodes.get(node) {
        if homeless.label == label {
            return true;
        }
        node = homeless.parent;
    }
    false
}

#[cfg(test)]
mod tests {
    use super::*;

    /// A host that holds one label only.
    struct OneEach(Vec<f64>);

    impl Stakes for OneEach {
        fn own(&self, pairing: usize) -> f64 {
            self.0[pairing]
        }

        fn shared(&self, _: usize, pairings: impl Iterator<Item = usize> + Clone) -> f64 {
            10.0 * f64::from(u32::try_from(pairings.count().saturating_sub(1)).unwrap_or(u32::MAX))
        }

        fn apart_m(&self) -> f64 {
            f64::INFINITY
        }
    }

    /// Least total cost by trying everything.
    fn exhaustive(pairings: &[Pairing], costs: &[f64], labels: usize, hosts: u32) -> f64 {
        fn go(p: &[Pairing], c: &[f64], label: usize, labels: usize, used: u32) -> f64 {
            if label == labels {
                return 0.0;
            }
            let mut best = UNCLAIMED + go(p, c, label + 1, labels, used);
            for (at, pairing) in p.iter().enumerate().filter(|(_, q)| q.label == label) {
                if used & (1 << pairing.host) == 0 {
                    let rest = go(p, c, label + 1, labels, used | 1 << pairing.host);
                    best = best.min(c[at] + rest);
                }
            }
            best
        }
        assert!(hosts < 32);
        go(pairings, costs, 0, labels, 0)
    }

    proptest::proptest! {
        #![proptest_config(proptest::test_runner::Config {
            failure_persistence: None,
            ..Default::default()
        })]

        #[test]
        fn the_assignment_costs_no_more_than_any_other(
            labels in 1usize..7,
            hosts in 1usize..7,
            table in proptest::collection::vec(0.0f64..8.0, 49),
        ) {
            let mut pairings = Vec::new();
            let mut costs = Vec::new();
            for label in 0..labels {
                for host in 0..hosts {
                    let cost = table[label * 7 + host];
                    if cost < 5.0 {
                        pairings.push(Pairing { label, host, station_m: 0.0 });
                        costs.push(cost);
                    }
                }
            }
            let stakes = OneEach(costs.clone());
            let taken = Settlement::new(&pairings, labels, hosts, &stakes, &[]).settle();
            let total: f64 = taken.iter().map(|t| t.map_or(UNCLAIMED, |p| costs[p])).sum();
            let least = exhaustive(&pairings, &costs, labels, u32::try_from(hosts).unwrap_or(0));
            proptest::prop_assert!(total < least + 1e-4, "{total} {least}");
        }
    }
}
