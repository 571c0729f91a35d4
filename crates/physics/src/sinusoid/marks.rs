//! Loops and nodes of the standing wave.

use std::f64::consts::FRAC_PI_2;

use super::sketch::{FeedpointAnswer, Sketch};
use super::wave::ArmWave;

/// A place of note on the standing wave.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Mark {
    /// Distance from the wire's beginning, m.
    pub arc_m: f64,
    /// What is there.
    pub kind: MarkKind,
}

/// What stands at a mark. Voltage loops sit on current nodes and voltage nodes on current loops.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum MarkKind {
    /// Most current: a voltage node.
    CurrentLoop,
    /// Least current: a voltage loop. With radiation it is a minimum, not a zero, except at the wire's ends.
    CurrentNode,
}

impl Sketch {
    /// Current loops and nodes, by rising distance from the wire's beginning.
    ///
    /// The wire's ends are nodes; along each arm, seen from its end, a loop or node follows every quarter wave (of the
    /// wave on the wire, end effect included). At the feedpoint the two arms meet with a kink, so there
    ///
    /// * a loop (or node) that both arms have within an eighth of a wave before the feedpoint is one, at the feedpoint;
    /// * the feedpoint is a loop if both currents still rise toward it, and a node if both fall toward it and come
    ///   within an eighth of a wave of their nodes.
    #[must_use]
    pub fn marks(&self, answer: &FeedpointAnswer) -> Vec<Mark> {
        let [a, b] = self.arm_waves(answer).map(|wave| QuarterWaves::of(&wave));
        let (at_feed, merged) = at_feedpoint(&a, &b);
        let length_m = self.length_m();
        let mut marks: Vec<Mark> = (0..a.count(merged)).map(|index| a.mark(index)).collect();
        marks.extend(at_feed.map(|kind| Mark { arc_m: self.wire().arm_a_m, kind }));
        marks.extend((0..b.count(merged)).rev().map(|index| {
            let Mark { arc_m: from_end_m, kind } = b.mark(index);
            Mark { arc_m: length_m - from_end_m, kind }
        }));
        marks
    }
}

/// An arm in quarter waves from its end: number 0 is the node at the end, odd numbers are loops.
struct QuarterWaves {
    quarter_m: f64,
    at_feed: f64,
}

impl QuarterWaves {
    fn of(wave: &ArmWave) -> Self {
        let quarter_m = FRAC_PI_2 / wave.propagation_per_m.im;
        Self { quarter_m, at_feed: wave.length_m / quarter_m }
    }

    fn kind(number: f64) -> MarkKind {
        if number % 2.0 < 0.5 { MarkKind::CurrentNode } else { MarkKind::CurrentLoop }
    }

    fn mark(&self, number: usize) -> Mark {
        let number = number as f64;
        Mark { arc_m: number * self.quarter_m, kind: Self::kind(number) }
    }

    /// How many marks lie on the arm itself, without the one merged into the feedpoint.
    fn count(&self, merged: bool) -> usize {
        let inside = self.at_feed.floor() as usize + 1;
        if merged { inside - 1 } else { inside }
    }

    /// The mark within an eighth of a wave of the feedpoint.
    fn nearest(&self) -> f64 {
        self.at_feed.round()
    }

    fn nearest_is_inside(&self) -> bool {
        self.nearest() >= 1.0 && self.nearest() <= self.at_feed
    }

    fn rises_at_feed(&self) -> bool {
        self.at_feed.floor() % 2.0 < 0.5
    }
}

/// What stands at the feedpoint, and whether the arms' last marks are merged into it.
fn at_feedpoint(a: &QuarterWaves, b: &QuarterWaves) -> (Option<MarkKind>, bool) {
    let nearest = [a, b].map(|arm| QuarterWaves::kind(arm.nearest()));
    if nearest[0] == nearest[1] && a.nearest_is_inside() && b.nearest_is_inside() {
        return (Some(nearest[0]), true);
    }
    let kind = match (a.rises_at_feed(), b.rises_at_feed()) {
        (true, true) => Some(MarkKind::CurrentLoop),
        (false, false) if nearest == [MarkKind::CurrentNode; 2] => Some(MarkKind::CurrentNode),
        _ => None,
    };
    (kind, false)
}
