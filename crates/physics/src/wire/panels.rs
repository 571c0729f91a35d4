//! What a boundary gives back varies slowly along the wires: it is told at a few nodes and interpolated between them.
//!
//! Straight runs of segments are divided into panels, none longer than a part of the shortest wavelength or than a few
//! times its height, for an image is the nearest thing that a reflected wave can come from. Each panel has up to
//! [`MOST_NODES`] Gauss-Legendre nodes with their Lagrange polynomials; a segment sees them as its moments over them.
//! So the cost of a boundary's kernels is that of a few dozen nodes, however fine the mesh.

use super::reflection::Element;
use super::segment::Segment;
use super::shapes::Shapes;
use super::vector::{advance, distance, dot};
use crate::earth::Reach;
use crate::field::quadrature::gauss_legendre;

/// Most nodes of a panel.
pub(super) const MOST_NODES: usize = 8;
/// Fewest nodes of a panel.
const FEWEST_NODES: usize = 3;
/// Longest panel, in shortest wavelengths: e^(−jkR) over it is within 2e-4 of the polynomial of 8 nodes.
const LONGEST_WAVELENGTHS: f64 = 0.85;
/// Longest panel, in heights of its lowest point. An image is two heights away: the polynomial errs by about 3⁻⁸ of it.
const LONGEST_HEIGHTS: f64 = 3.0;

/// Heights below this count as this, m: only the last hand's breadth of a wire that goes down to the earth.
const LOWEST_M: f64 = 0.05;

/// Nodes of all wires, and how the segments see them.
#[derive(Clone, Debug)]
pub(super) struct Panels {
    /// Places and directions of the nodes.
    pub nodes: Vec<Element>,
    spans: Vec<Span>,
    /// Range of spans of each segment.
    of_segment: Vec<[usize; 2]>,
}

/// The part of a segment that lies on one panel.
#[derive(Clone, Copy, Debug)]
pub(super) struct Span {
    /// Index of the panel's first node.
    pub first_node: usize,
    /// Number of its nodes.
    pub nodes: usize,
    /// ∫ L dξ of each node's polynomial over the part, ξ from −1 to 1 along the whole segment.
    even: [f64; MOST_NODES],
    /// √3·∫ ξ·L dξ
    odd: [f64; MOST_NODES],
}

/// Weights of a segment's two end currents at the nodes of a span.
#[derive(Clone, Copy, Debug)]
pub(super) struct Weights {
    /// ∫ S·L ds of the current that has 1 A at the segment's beginning, and at its end, m.
    pub current_m: [[f64; MOST_NODES]; 2],
    /// The same of k⁻¹·dI/ds.
    pub slope_m: [[f64; MOST_NODES]; 2],
}

impl Panels {
    /// `wavelength_m` is the shortest one of interest.
    pub fn new(segments: &[Segment], wavelength_m: f64) -> Self {
        let mut panels = Self { nodes: Vec::new(), spans: Vec::new(), of_segment: Vec::new() };
        let mut first = 0;
        for next in 1..=segments.len() {
            if next == segments.len() || !goes_straight_on(&segments[next - 1], &segments[next]) {
                panels.add_run(&segments[first..next], wavelength_m);
                first = next;
            }
        }
        panels
    }

    /// Distances between nodes, from the heights' box and the ground plan's.
    pub fn reach(&self) -> Reach {
        let ends = |axis: usize| {
            let places = self.nodes.iter().map(|node| node.position_m[axis]);
            places.fold([f64::INFINITY, f64::NEG_INFINITY], |[low, high], x| [low.min(x), high.max(x)])
        };
        let [[west, east], [south, north], [low, high]] = [0, 1, 2].map(ends);
        Reach {
            rho_max_m: (east - west).hypot(north - south),
            zeta_min_m: 2.0 * low.max(LOWEST_M),
            zeta_max_m: 2.0 * high.max(LOWEST_M),
        }
    }

    /// Parts of a segment on panels.
    pub fn spans(&self, segment: usize) -> &[Span] {
        let [begin, end] = self.of_segment[segment];
        &self.spans[begin..end]
    }

    /// Adds the panels of consecutive segments in one straight line.
    fn add_run(&mut self, run: &[Segment], wavelength_m: f64) {
        let (Some(first), Some(last)) = (run.first(), run.last()) else { return };
        let (from_m, direction) = (first.from_m, first.direction());
        let length_m = distance(from_m, last.to_m);
        let height_m = |arc_m: f64| (from_m[2] + arc_m * direction[2]).max(LOWEST_M);
        let longest_m = |[a, b]: [f64; 2]| {
            (LONGEST_WAVELENGTHS * wavelength_m).min(LONGEST_HEIGHTS * height_m(a).min(height_m(b)))
        };
        let mut on_run: Vec<([f64; 2], usize)> = Vec::new();
        divide([0.0, length_m], &longest_m, &mut |ends_m: [f64; 2]| {
            let share = (ends_m[1] - ends_m[0]) / longest_m(ends_m);
            let more = ((MOST_NODES - FEWEST_NODES) as f64 * share).ceil() as usize;
            let nodes = (FEWEST_NODES + more).min(MOST_NODES);
            on_run.push((ends_m, self.nodes.len()));
            for (x, _) in gauss_legendre(nodes) {
                let arc_m = 0.5 * (ends_m[0] + ends_m[1] + x * (ends_m[1] - ends_m[0]));
                self.nodes.push(Element { position_m: advance(from_m, direction, arc_m), direction });
            }
        });
        let mut arc_m = 0.0;
        for segment in run {
            let ends_m = [arc_m, arc_m + segment.length_m()];
            self.add_segment(ends_m, &on_run);
            arc_m = ends_m[1];
        }
    }

    /// Adds the spans of a segment between two places of its run; panels by rising place.
    fn add_segment(&mut self, ends_m: [f64; 2], on_run: &[([f64; 2], usize)]) {
        let begin = self.spans.len();
        let tiny_m = 1e-9 * (ends_m[1] - ends_m[0]);
        for (index, &(panel_m, first_node)) in on_run.iter().enumerate() {
            // The outermost panels take what rounding leaves beyond them.
            let from_m = if index == 0 { ends_m[0] } else { ends_m[0].max(panel_m[0]) };
            let to_m = if index + 1 == on_run.len() { ends_m[1] } else { ends_m[1].min(panel_m[1]) };
            if to_m - from_m > tiny_m {
                let next_node = on_run.get(index + 1).map_or(self.nodes.len(), |next| next.1);
                self.spans.push(Span::new(ends_m, [from_m, to_m], panel_m, [first_node, next_node]));
            }
        }
        self.of_segment.push([begin, self.spans.len()]);
    }
}

/// Divides a stretch until every part is short enough.
fn divide([from, to]: [f64; 2], longest: &impl Fn([f64; 2]) -> f64, give: &mut impl FnMut([f64; 2])) {
    let parts = ((to - from) / longest([from, to])).ceil();
    if parts <= 1.0 {
        give([from, to]);
        return;
    }
    // On a level wire equal parts of the right length; on a sloping one the upper parts are longer.
    let parts =
        if parts < 2.5 || (longest([from, from]) - longest([to, to])).abs() > 1e-6 { 2.0 } else { parts };
    let step = (to - from) / parts;
    let mut index = 0.0;
    while index < parts {
        divide([from + step * index, from + step * (index + 1.0)], longest, give);
        index += 1.0;
    }
}

fn goes_straight_on(before: &Segment, next: &Segment) -> bool {
    distance(before.to_m, next.from_m) < 1e-9 && dot(before.direction(), next.direction()) > 1.0 - 1e-12
}

impl Span {
    fn new(segment_m: [f64; 2], part_m: [f64; 2], panel_m: [f64; 2], nodes: [usize; 2]) -> Self {
        let count = nodes[1] - nodes[0];
        let mut span =
            Self { first_node: nodes[0], nodes: count, even: [0.0; MOST_NODES], odd: [0.0; MOST_NODES] };
        let places = gauss_legendre(count);
        let half_m = 0.5 * (segment_m[1] - segment_m[0]);
        let middle_m = 0.5 * (segment_m[0] + segment_m[1]);
        // Exact for ξ times a polynomial of the panel.
        for (x, weight) in gauss_legendre(count / 2 + 1) {
            let arc_m = 0.5 * (part_m[0] + part_m[1] + x * (part_m[1] - part_m[0]));
            let xi = (arc_m - middle_m) / half_m;
            let weight = weight * 0.5 * (part_m[1] - part_m[0]) / half_m;
            let on_panel = (2.0 * arc_m - panel_m[0] - panel_m[1]) / (panel_m[1] - panel_m[0]);
            for node in 0..count {
                let value = lagrange(&places, node, on_panel) * weight;
                span.even[node] += value;
                span.odd[node] += 3_f64.sqrt() * xi * value;
            }
        }
        span
    }

    /// Nodes and their shares in the mean over the segment.
    pub fn shares(&self) -> impl Iterator<Item = (usize, f64)> + '_ {
        self.even[..self.nodes].iter().enumerate().map(|(node, even)| (self.first_node + node, 0.5 * even))
    }

    /// Weights of the two end currents of the segment.
    pub fn weights(&self, shapes: &Shapes) -> Weights {
        let pair = |even: f64, odd: f64, sign: f64| {
            std::array::from_fn(|node| 0.5 * (even * self.even[node] + sign * odd * self.odd[node]))
        };
        // The slope of the even part is odd, that of the odd part even.
        let slope = |sign: f64| {
            std::array::from_fn(|node| {
                0.5 * (shapes.even_slope * self.odd[node] + sign * shapes.odd_slope * self.even[node])
            })
        };
        Weights {
            current_m: [pair(shapes.even, shapes.odd, -1.0), pair(shapes.even, shapes.odd, 1.0)],
            slope_m: [slope(-1.0), slope(1.0)],
        }
    }
}

/// Lagrange polynomial of a node at a place, both on −1 to 1.
fn lagrange(places: &[(f64, f64)], node: usize, x: f64) -> f64 {
    let own = places[node].0;
    let others = places.iter().enumerate().filter(|(other, _)| *other != node);
    others.map(|(_, (place, _))| (x - place) / (own - place)).product()
}

#[cfg(test)]
mod tests {
    use super::*;

    fn segments(vertices_m: &[[f64; 3]], per_side: usize) -> Vec<Segment> {
        let side = |pair: &[[f64; 3]]| -> Vec<Segment> {
            let at =
                |part: usize| super::super::vector::lerp(pair[0], pair[1], part as f64 / per_side as f64);
            (0..per_side)
                .map(|part| Segment { from_m: at(part), to_m: at(part + 1), radius_m: 1e-3 })
                .collect()
        };
        vertices_m.windows(2).flat_map(side).collect()
    }

    /// A function of the place, smooth as an image's wave, is integrated over every segment by its values at the nodes.
    #[test]
    fn nodes_stand_for_what_is_smooth() {
        let (wavelength_m, image_m) = (10.0, [2.0, 0.5, -1.4]);
        let k = std::f64::consts::TAU / wavelength_m;
        let wave = |at_m: [f64; 3]| {
            let r = distance(at_m, image_m);
            (k * r).cos() / r
        };
        for vertices_m in [
            vec![[-9.0, 0.0, 1.5], [11.0, 0.0, 1.5]],
            vec![[-9.0, 0.0, 1.4], [0.0, 0.0, 9.0], [9.0, 3.0, 1.6]],
            vec![[2.0, 0.0, 1.4], [2.0, 0.0, 6.0]],
        ] {
            let segments = segments(&vertices_m, 40);
            let panels = Panels::new(&segments, wavelength_m);
            assert!(panels.nodes.len() < 90, "{} nodes", panels.nodes.len());
            for (index, segment) in segments.iter().enumerate() {
                let [mut even, mut odd] = [0.0; 2];
                for span in panels.spans(index) {
                    for node in 0..span.nodes {
                        let value = wave(panels.nodes[span.first_node + node].position_m);
                        even += span.even[node] * value;
                        odd += span.odd[node] * value;
                    }
                }
                let [mut even_expected, mut odd_expected] = [0.0; 2];
                for (xi, weight) in gauss_legendre(12) {
                    let along_m = 0.5 * (xi + 1.0) * segment.length_m();
                    let value = weight * wave(advance(segment.from_m, segment.direction(), along_m));
                    even_expected += value;
                    odd_expected += 3_f64.sqrt() * xi * value;
                }
                // Against the nearest image's 1/R.
                let size = 2.0 / distance(segment.from_m, image_m);
                assert!((even - even_expected).abs() < 3e-4 * size, "{index}: {even} for {even_expected}");
                assert!((odd - odd_expected).abs() < 3e-4 * size, "{index}: {odd} for {odd_expected}");
            }
        }
    }

    /// The polynomials of a panel sum to one: a segment's spans hold all of it.
    #[test]
    fn spans_fill_their_segment() {
        let segments = segments(&[[0.0, 0.0, 0.1], [3.0, 0.0, 0.1], [3.0, 0.0, 20.0]], 7);
        let panels = Panels::new(&segments, 50.0);
        for index in 0..segments.len() {
            let sums = panels.spans(index).iter().fold([0.0; 2], |[even, odd], span| {
                [even + span.even.iter().sum::<f64>(), odd + span.odd.iter().sum::<f64>()]
            });
            assert!((sums[0] - 2.0).abs() < 1e-9 && sums[1].abs() < 1e-9, "{index}: {sums:?}");
        }
        // A segment over several panels, and several segments on one.
        assert!(panels.spans(0).len() > 1 && panels.spans(13).len() == 1);
    }
}
