//! The outputs of one node over all draws, kept as far as bounds need them.

use super::NodeBounds;
use crate::graph::Node;
use crate::notebook::cell::zone::Extent;
use crate::notebook::datum::{Datum, Output};

/// The outputs of one node over all draws.
pub(super) struct Record {
    pub(super) node: Node,
    /// The nominal ranks.
    pub(super) nominal: Vec<f64>,
    /// For each output its extremes, from the first draw that moves it on.
    pub(super) tails: Vec<Option<Tails>>,
    /// In how many draws there was no value, or one of another form.
    pub(super) failed: u32,
}

impl Record {
    /// Notes the draw of this number, counted from 0, out of so many.
    pub(super) fn note(&mut self, draw: usize, draws: usize, datum: Option<&Datum>) {
        let Some(datum) = datum.filter(|datum| datum.is_ready()) else {
            self.failed += 1;
            return;
        };
        let mut at = 0;
        let mut silent = false;
        datum.visit(&mut |_, output| {
            silent |= matches!(
                output,
                Output::Extent {
                    extent: Extent::NotAssessed,
                    ..
                }
            );
            if let (Some(nominal), Some(tails)) = (self.nominal.get(at), self.tails.get_mut(at)) {
                let rank = rank(&output);
                if let Some(tails) = tails {
                    tails.note(rank);
                } else if rank.to_bits() != nominal.to_bits() {
                    let mut new = Tails::new(draws);
                    for _ in 0..draw.min(new.most) {
                        new.note(*nominal);
                    }
                    new.note(rank);
                    *tails = Some(new);
                }
            }
            at += 1;
        });
        // A draw with other outputs than the nominal ones cannot be compared,
        // nor one in which guidance says nothing.
        if at != self.nominal.len() || silent {
            self.failed += 1;
        }
    }

    /// Notes a draw that left everything at its nominal value.
    pub(super) fn note_nominal(&mut self) {
        for (tails, nominal) in self.tails.iter_mut().zip(&self.nominal) {
            if let Some(tails) = tails {
                tails.note(*nominal);
            }
        }
    }

    /// Returns the bounds. Where a draw had no value there are none.
    pub(super) fn bounds(self) -> NodeBounds {
        let ranks = self.tails.into_iter().map(|tails| {
            // What no draw moves is not reached by any spread.
            let interval = tails.filter(|_| self.failed == 0)?.interval();
            interval.filter(|(low, high)| are_apart(*low, *high))
        });
        NodeBounds {
            ranks: ranks.collect(),
            failed: self.failed,
        }
    }
}

/// The least and the greatest of one output over the draws: as many of each as
/// lie outside the central 95 %, and one more.
#[derive(Clone, Debug, PartialEq)]
pub(super) struct Tails {
    most: usize,
    /// Growing.
    low: Vec<f64>,
    /// Falling.
    high: Vec<f64>,
    /// Whether every rank so far was a number.
    ordered: bool,
}

impl Tails {
    fn new(draws: usize) -> Tails {
        // JCGM 101:2008, 7.7.2: q = pM, r = (M - q)/2, the interval from the
        // r-th to the (r+q)-th, counted from 1. Halves go outwards.
        let most = (draws / 40).max(1);
        Tails {
            most,
            low: Vec::with_capacity(most + 1),
            high: Vec::with_capacity(most + 1),
            ordered: true,
        }
    }

    fn note(&mut self, rank: f64) {
        self.ordered &= !rank.is_nan();
        keep(&mut self.low, self.most, rank, |a, b| a < b);
        keep(&mut self.high, self.most, rank, |a, b| a > b);
    }

    /// Returns the probabilistically symmetric interval that covers 95 % of the
    /// draws, or `None` if one of them does not order.
    fn interval(&self) -> Option<(f64, f64)> {
        let (low, high) = (self.low.last()?, self.high.last()?);
        self.ordered.then_some((*low, *high))
    }
}

/// Puts a rank into a list of the first few, if it belongs there.
fn keep(list: &mut Vec<f64>, most: usize, rank: f64, before: impl Fn(f64, f64) -> bool) {
    if list.len() == most {
        if list.last().is_none_or(|last| !before(rank, *last)) {
            return;
        }
        let _ = list.pop();
    }
    let place = list.partition_point(|kept| !before(rank, *kept));
    list.insert(place, rank);
}

/// Returns whether two ranks differ by more than the rounding of the arithmetic
/// between them.
fn are_apart(low: f64, high: f64) -> bool {
    low < high
        && (low.is_infinite() || high.is_infinite() || {
            high - low > 1e-12 * low.abs().max(high.abs())
        })
}

/// Returns the number by which an output orders among the draws; NaN for one
/// that does not order.
pub(super) fn rank(output: &Output<'_>) -> f64 {
    match output {
        Output::Quantity(quantity) => quantity.si,
        Output::Time(span) => span.seconds(),
        Output::Extent { extent, .. } => extent.rank(),
        Output::Word(_) | Output::Nothing => f64::NAN,
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn interval(ranks: impl ExactSizeIterator<Item = f64>) -> Option<(f64, f64)> {
        let mut tails = Tails::new(ranks.len());
        for rank in ranks {
            tails.note(rank);
        }
        tails.interval()
    }

    #[test]
    fn the_interval_holds_the_middle_95_percent() {
        // 389 and 1000 have no common factor: every number once, out of order.
        let shuffled = || (0..1000_u32).map(|index| f64::from(index * 389 % 1000 + 1));
        assert_eq!(interval(shuffled()), Some((25.0, 976.0)));
        let with_none = shuffled().map(|rank| if rank == 4.0 { f64::NAN } else { rank });
        assert_eq!(interval(with_none), None);
        let few = (0..40_u32).map(|index| f64::from(index * 7 % 40));
        assert_eq!(interval(few), Some((0.0, 39.0)));
    }

    #[test]
    fn ends_without_limit_and_ties_keep_their_places() {
        let ranks = (0..1000_u32).map(|index| match index % 100 {
            0..4 => f64::NEG_INFINITY,
            4..96 => 2.0,
            _ => f64::INFINITY,
        });
        assert_eq!(interval(ranks), Some((f64::NEG_INFINITY, f64::INFINITY)));
        let ranks = (0..1000_u32).map(|index| if index % 100 < 98 { 2.0 } else { 3.0 });
        assert_eq!(interval(ranks), Some((2.0, 2.0)));
    }
}
