//! The search over the parts that stand before the last one.

use num_complex::Complex64;

use super::element::Element;
use super::two::{last, promising};
use super::{Range, UnitProblem};

/// The bar of a standing-wave ratio.
pub(super) struct Bar {
    /// (s + 1/s)/2, a hair below the wanted one, so that rounding never leaves a setting outside.
    pub mismatch: f64,
    /// The wanted one itself, with a hair of rounding.
    fits: f64,
}

impl Bar {
    pub fn of(swr: f64) -> Self {
        let excess = |over_one: f64| 0.5 * over_one * over_one / (1.0 + over_one);
        // Rounding of the mismatch is absolute, so a bar near 1 needs its own hair.
        let aim = excess((swr - 1.0) * (1.0 - 1e-9));
        Self { mismatch: 1.0 + aim - (0.5 * aim).min(1e-13), fits: 1.0 + excess(swr - 1.0) }
    }
}

/// A setting of all parts from one on.
#[derive(Clone, Copy, Debug)]
pub(super) struct Found {
    /// (s + 1/s)/2 at the source.
    pub mismatch: f64,
    /// Share of the power that passes.
    pub passed: f64,
    /// Sizes of the parts, the one nearest to the load first.
    pub sizes: [f64; 3],
}

impl Found {
    pub fn fits(&self, bar: &Bar) -> bool {
        self.mismatch <= bar.fits
    }

    /// Within the bar before outside; inside the bar by loss, outside by mismatch.
    fn beats(&self, other: &Self, bar: &Bar) -> bool {
        match (self.fits(bar), other.fits(bar)) {
            (true, true) => self.passed > other.passed,
            (false, false) => self.mismatch < other.mismatch,
            (fits, _) => fits,
        }
    }

    fn behind(self, size: f64) -> Self {
        Self { sizes: [size, self.sizes[0], self.sizes[1]], ..self }
    }
}

/// How finely a part is searched.
struct Effort {
    /// Samples along a variable part.
    samples: u32,
    /// Steps of the golden section.
    rounds: u32,
    /// Steps of a bank that are all tried; a larger one is thinned to this many first.
    most_steps: u32,
}

const OF_TWO: Effort = Effort { samples: 20, rounds: 18, most_steps: 64 };
const OF_THREE: Effort = Effort { samples: 14, rounds: 14, most_steps: 48 };

pub(super) fn search(elements: &[Element], problem: &UnitProblem) -> Found {
    let bar = Bar::of(problem.largest_swr);
    let z = problem.load_ohm / problem.target_ohm;
    let w = match elements[0].place {
        super::Place::Series => z,
        super::Place::Across => z.inv(),
    };
    match elements {
        [first, second] => two(w, 1.0, first, second, &bar),
        [first, second, third] => over(first, &[], &OF_THREE, &bar, |size| {
            let after = w + first.direction * size;
            two(after.inv(), w.re / after.re, second, third, &bar).behind(size)
        }),
        _ => last(w, 1.0, &elements[0], &bar),
    }
}

/// The best of two parts for an immittance in the plane of the first.
fn two(w: Complex64, passed: f64, first: &Element, second: &Element, bar: &Bar) -> Found {
    over(first, &promising(w, first, second), &OF_TWO, bar, |size| {
        let after = w + first.direction * size;
        last(after.inv(), passed * w.re / after.re, second, bar).behind(size)
    })
}

/// The best over all sizes of one part, for what follows from each.
fn over(
    element: &Element,
    promising: &[f64],
    effort: &Effort,
    bar: &Bar,
    follow: impl Fn(f64) -> Found,
) -> Found {
    match element.range {
        Range::Steps { first, step, count } => {
            let at = |index: u32| follow(element.size_of(first + step * f64::from(index)));
            // which step a promising size is next to; a bank has at most some thousand
            let near: Vec<u32> = promising
                .iter()
                .map(|&size| ((element.value_of(size) - first) / step).round())
                .filter(|index| index.is_finite())
                .map(|index| index.clamp(0.0, f64::from(count - 1)) as u32)
                .collect();
            over_steps(count, effort.most_steps, &near, bar, at)
        }
        Range::Variable { .. } => {
            let mut sizes = sampled(element, effort.samples);
            let [low, high] = element.limits();
            sizes.extend(promising.iter().filter(|size| size.is_finite()).map(|size| size.clamp(low, high)));
            sizes.sort_unstable_by(f64::total_cmp);
            Scan { bar, rounds: effort.rounds, follow }.best(&sizes)
        }
    }
}

/// A near miss: a mismatch this much over the bar's share above 1 may hide a step that fits.
const NEAR_MISS: f64 = 12.0;

/// How many steps on either side of a promising one are tried.
const AROUND: u32 = 2;

/// All steps of a bank; of a large one a thinned bank and what is promising, and then the neighbourhood of the best.
fn over_steps(count: u32, most: u32, near: &[u32], bar: &Bar, at: impl Fn(u32) -> Found) -> Found {
    let stride = count.div_ceil(most);
    let mut best = (0, at(0));
    let consider = |best: &mut (u32, Found), index: u32| {
        let found = at(index);
        if found.beats(&best.1, bar) {
            *best = (index, found);
        }
    };
    let around = |index: u32, reach: u32| index.saturating_sub(reach)..(index + reach + 1).min(count);
    for index in (stride..count).step_by(stride as usize).chain([count - 1]) {
        consider(&mut best, index);
    }
    if stride == 1 {
        return best.1;
    }
    for &index in near {
        around(index, AROUND).for_each(|index| consider(&mut best, index));
    }
    around(best.0, stride).for_each(|index| consider(&mut best, index));
    if !best.1.fits(bar) && best.1.mismatch - 1.0 < NEAR_MISS * (bar.mismatch - 1.0) {
        (0..count).for_each(|index| consider(&mut best, index));
    }
    best.1
}

/// Sizes spread evenly in the logarithm, over at most four decades, with both ends.
fn sampled(element: &Element, samples: u32) -> Vec<f64> {
    let [low, high] = element.limits();
    let start = low.max(high * 1e-4);
    let growth = (high / start).ln() / f64::from(samples);
    let mut sizes: Vec<f64> = (0..samples).map(|n| start * (growth * f64::from(n)).exp()).collect();
    sizes.extend([low, high]);
    sizes
}

/// 1 − 1/φ of the golden section.
const GOLDEN: f64 = 0.381_966_011_250_105;

struct Scan<'a, F> {
    bar: &'a Bar,
    rounds: u32,
    follow: F,
}

impl<F: Fn(f64) -> Found> Scan<'_, F> {
    /// The best over rising sizes and what lies between them.
    ///
    /// Around the best of each run of sizes that fit a golden section goes on: toward the extremum inside the run,
    /// or toward its edge, since what does not fit is worse than all that does.
    fn best(&self, sizes: &[f64]) -> Found {
        let mut tried: Vec<(f64, Found)> = sizes.iter().map(|&size| (size, (self.follow)(size))).collect();
        if !tried.iter().any(|(_, found)| found.fits(self.bar)) {
            self.deepen(&mut tried);
        }
        let mut best = tried[0].1;
        let mut consider = |found: Found| {
            if found.beats(&best, self.bar) {
                best = found;
            }
        };
        let mut index = 0;
        while index < tried.len() {
            let mut top = index;
            consider(tried[index].1);
            let start = index;
            while index < tried.len() && tried[index].1.fits(self.bar) {
                if tried[index].1.beats(&tried[top].1, self.bar) {
                    top = index;
                }
                index += 1;
            }
            if index > start {
                let [before, after] = [top.saturating_sub(1), (top + 1).min(tried.len() - 1)];
                consider(tried[top].1);
                consider(self.golden(tried[before].0, tried[after].0).1);
            } else {
                index += 1;
            }
        }
        best
    }

    /// Where nothing fits: goes down into each valley of the mismatch.
    fn deepen(&self, tried: &mut Vec<(f64, Found)>) {
        let mut deeper = Vec::new();
        for n in 0..tried.len() {
            let here = tried[n].1.mismatch;
            let before = n.saturating_sub(1);
            let after = (n + 1).min(tried.len() - 1);
            if here <= tried[before].1.mismatch && here <= tried[after].1.mismatch {
                deeper.push(self.golden(tried[before].0, tried[after].0));
            }
        }
        tried.extend(deeper);
        tried.sort_unstable_by(|a, b| a.0.total_cmp(&b.0));
    }

    /// The best between two sizes, by golden section.
    fn golden(&self, low: f64, high: f64) -> (f64, Found) {
        let (mut low, mut high) = (low, high);
        let at = |size: f64| (size, (self.follow)(size));
        let mut left = at(low + GOLDEN * (high - low));
        let mut right = at(high - GOLDEN * (high - low));
        for _ in 0..self.rounds {
            if left.1.beats(&right.1, self.bar) {
                (high, right) = (right.0, left);
                left = at(low + GOLDEN * (high - low));
            } else {
                (low, left) = (left.0, right);
                right = at(high - GOLDEN * (high - low));
            }
        }
        if left.1.beats(&right.1, self.bar) { left } else { right }
    }
}
