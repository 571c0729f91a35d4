//! The standing wave on a wire, in pixels: ribbon, grain and whiskers at a phase of the RF cycle, their envelope, and
//! the read-out of any place. It only scales and projects what the report holds.

use eframe::egui::{Pos2, Rect, Vec2};
use num_complex::Complex64;
use station::hang::HungWire;
use station::report::{Mark, WireWave};

use super::side_view::SideView;
use super::track::{NearBend, Track};

/// Distance between two samples of the wire, px.
const SAMPLE_PX: f32 = 4.0;
/// Most samples of a wire, however far one zooms in.
const MOST_SAMPLES: usize = 900;
/// Distance between two whiskers, px.
const WHISKER_GAP_PX: f32 = 8.0;
/// Distance between two grains at rest, px.
const GRAIN_GAP_PX: f32 = 17.0;
/// How far the largest current carries its grains to and fro, px.
const GRAIN_SWING_PX: f32 = 7.0;
/// Two samples closer than this enclose the gap at the feedpoint, where the potential jumps: a place in between is read
/// on the side with more volts, m.
const GAP_M: f64 = 0.03;
/// The thinnest ribbon that shows its grain, half of it, px.
const GRAIN_HALF_PX: f32 = 2.5;

/// How far from a bend its legs may meet again, in samples of the wire.
const MITRE_SAMPLES: usize = 40;
/// Pieces that run back and lie no farther apart belong to one bend, in samples of the wire.
const MITRE_GAP_SAMPLES: usize = 6;

/// The longest whisker of a stub, in longest whiskers of all else.
const LONGEST_WHISKER: f32 = 1.25;

/// A peak phasor.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub struct Phasor {
    re: f32,
    im: f32,
}

impl From<Complex64> for Phasor {
    fn from(z: Complex64) -> Self {
        Self { re: z.re as f32, im: z.im as f32 }
    }
}

impl Phasor {
    /// The value now: Re(A·exp(jφ)).
    fn now(self, phase: Phase) -> f32 {
        self.re * phase.cos - self.im * phase.sin
    }

    /// What has flowed, in units of the peak: the integral over time, Re(A·exp(jφ)/j).
    fn flowed(self, phase: Phase) -> f32 {
        self.re * phase.sin + self.im * phase.cos
    }

    fn peak(self) -> f32 {
        self.re.hypot(self.im)
    }

    fn toward(self, other: Self, share: f32) -> Self {
        Self { re: self.re + share * (other.re - self.re), im: self.im + share * (other.im - self.im) }
    }
}

/// A moment of the RF cycle.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Phase {
    cos: f32,
    sin: f32,
}

impl Phase {
    /// From degrees.
    pub fn degrees(phase_deg: f64) -> Self {
        let (sin, cos) = phase_deg.to_radians().sin_cos();
        Self { cos: cos as f32, sin: sin as f32 }
    }
}

/// A place of the wire.
#[derive(Clone, Copy, Debug)]
struct Sample {
    at: Pos2,
    /// Away from the wire, on the side of plus.
    off: Vec2,
    current: Phasor,
    voltage: Phasor,
    /// The bend nearby.
    bend: Option<NearBend>,
}

impl Sample {
    /// Whether something that stands off the wire would cross the bisector of a bend.
    fn crosses(&self, offset_px: f32) -> bool {
        self.bend.is_some_and(|b| offset_px * b.side > b.room_px)
    }

    /// A place off the wire, positive on the side of plus.
    fn off_by(&self, offset_px: f32) -> Pos2 {
        self.at + self.off * offset_px
    }
}

/// A loop or a node on the screen.
#[derive(Clone, Copy, Debug)]
pub struct WaveMark {
    /// Its place on the wire.
    pub at: Pos2,
    /// Where its sign is drawn: at its place, or off the wire where a grip is in the way.
    pub sign: Pos2,
    /// Away from the wire, on the side of plus.
    pub off: Vec2,
    /// What it is and where.
    pub mark: Mark,
    /// What stands there.
    pub reading: Reading,
}

/// What stands at a place of the wire: peak values at the watts that reach it.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Reading {
    /// Distance from the wire's beginning, m.
    pub arc_m: f64,
    /// Peak current, A.
    pub current_a: f64,
    /// Peak potential, V; indicative.
    pub voltage_v: f64,
}

/// How large the wave is drawn, and for how many watts.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Size {
    /// Half the thickness of the ribbon at the largest current, px.
    pub ribbon_px: f32,
    /// Length of the longest whisker, px.
    pub whisker_px: f32,
    /// Watts that reach the wire, W.
    pub watts: f64,
}

/// The standing wave of one wire, ready for any phase.
pub struct Wave<'a> {
    source: &'a WireWave,
    /// Arc of the report over arc of the wire as it hangs now: while an answer is on its way they differ a little.
    stretch: f64,
    amplitude: f64,
    step_px: f32,
    samples: Vec<Sample>,
    peaks: Peaks,
    size: Size,
    /// What lies outside is not drawn piece by piece.
    seen: Rect,
}

/// What the ribbon's thickness and the whiskers' length are measured by.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub struct Peaks {
    /// Largest current, A for 1 W.
    pub current_a: f32,
    /// Largest potential, V for 1 W.
    pub voltage_v: f32,
}

impl Peaks {
    /// The larger of each.
    pub fn or(self, other: Self) -> Self {
        Self {
            current_a: self.current_a.max(other.current_a),
            voltage_v: self.voltage_v.max(other.voltage_v),
        }
    }
}

/// Both edges of the ribbon.
#[derive(Clone, Debug, Default)]
pub struct Ribbon {
    /// On the side of plus.
    pub upper: Vec<Pos2>,
    /// On the side of minus.
    pub lower: Vec<Pos2>,
}

impl<'a> Wave<'a> {
    /// Lays a wave along a wire. `None` where there is nothing to show.
    pub fn along(view: &SideView, wire: &HungWire, source: &'a WireWave, size: Size) -> Option<Self> {
        let count = source.arc_m.len();
        if count < 2 || source.current_a.len() != count || source.potential_v.len() != count {
            return None;
        }
        let track = Track::of(view, wire)?;
        let last_arc_m = *source.arc_m.last().filter(|&&m| m > 0.0)?;
        let mut wave = Self {
            source,
            stretch: last_arc_m / wire.length_m(),
            amplitude: size.watts.max(0.0).sqrt(),
            step_px: 0.0,
            samples: Vec::new(),
            peaks: Peaks::default(),
            size,
            seen: view.frame.expand(size.whisker_px),
        };
        let count = ((track.length_px() / SAMPLE_PX).ceil() as usize).clamp(8, MOST_SAMPLES);
        wave.step_px = track.length_px() / count as f32;
        wave.samples.reserve(count + 1);
        for n in 0..=count {
            let run_px = n as f32 * wave.step_px;
            let (at, arc_m) = track.at(run_px);
            let (current, voltage) = wave.phasors(arc_m);
            wave.samples.push(Sample {
                at,
                off: track.off(run_px),
                current,
                voltage,
                bend: track.bend(run_px),
            });
        }
        wave.peaks = wave.peaks_without(None);
        (wave.peaks.current_a > 0.0 || wave.peaks.voltage_v > 0.0).then_some(wave)
    }

    /// The largest current of the wire, and its largest potential outside a stub: arcs of the report, m.
    pub fn peaks_without(&self, stub: Option<(f64, f64)>) -> Peaks {
        let outside = |arc_m: f64| stub.is_none_or(|(from_m, to_m)| arc_m < from_m || arc_m > to_m);
        let norms = |values: &'a [Complex64]| values.iter().map(|z| z.norm() as f32);
        let placed = self.source.arc_m.iter().zip(norms(&self.source.potential_v));
        Peaks {
            current_a: norms(&self.source.current_a).fold(0.0, f32::max),
            voltage_v: placed.filter(|(arc_m, _)| outside(**arc_m)).map(|(_, v)| v).fold(0.0, f32::max),
        }
    }

    /// Measured by common peaks, so that wires can be compared.
    pub fn measured_by(self, peaks: Peaks) -> Self {
        Self { peaks, ..self }
    }

    /// Current and voltage for 1 W at a distance from the wire's beginning.
    fn phasors(&self, arc_m: f64) -> (Phasor, Phasor) {
        let arcs = &self.source.arc_m;
        let arc_m = arc_m * self.stretch;
        let after = arcs.partition_point(|&m| m < arc_m).clamp(1, arcs.len() - 1);
        let (from_m, to_m) = (arcs[after - 1], arcs[after]);
        let share = if to_m - from_m < GAP_M {
            let [before_v, after_v] = [after - 1, after].map(|n| self.source.potential_v[n].norm());
            if after_v > before_v { 1.0 } else { 0.0 }
        } else {
            ((arc_m - from_m) / (to_m - from_m)).clamp(0.0, 1.0)
        };
        let between = |values: &[Complex64]| {
            Phasor::from(values[after - 1]).toward(Phasor::from(values[after]), share as f32)
        };
        (between(&self.source.current_a), between(&self.source.potential_v))
    }

    /// The read-out at a distance from the wire's beginning.
    pub fn read(&self, arc_m: f64) -> Reading {
        let (current, voltage) = self.phasors(arc_m);
        Reading {
            arc_m,
            current_a: f64::from(current.peak()) * self.amplitude,
            voltage_v: f64::from(voltage.peak()) * self.amplitude,
        }
    }

    /// The read-outs at the wire's beginning and end.
    pub fn at_ends(&self) -> (Reading, Reading) {
        let last_m = self.source.arc_m[self.source.arc_m.len() - 1] / self.stretch;
        (self.read(0.0), self.read(last_m))
    }

    /// Loops and nodes.
    pub fn marks(&self, view: &SideView, wire: &HungWire) -> Vec<WaveMark> {
        let Some(track) = Track::of(view, wire) else { return Vec::new() };
        let mark = |&mark: &Mark| {
            let arc_m = mark.arc_m / self.stretch;
            let run_px = track.run_px(arc_m);
            let at = view.at(wire.point_at(arc_m));
            WaveMark { at, sign: at, off: track.off(run_px), mark, reading: self.read(arc_m) }
        };
        self.source.marks.iter().map(mark).collect()
    }

    fn ribbon_of(&self, half_px: impl Fn(&Sample) -> f32) -> Ribbon {
        let halves_px: Vec<f32> = self.samples.iter().map(half_px).collect();
        Ribbon { upper: self.edge(&halves_px, 1.0), lower: self.edge(&halves_px, -1.0) }
    }

    /// One edge of a ribbon. On the inner side of a bend what stands off one leg crosses what stands off the other:
    /// there both end.
    fn edge(&self, halves_px: &[f32], side: f32) -> Vec<Pos2> {
        let mut edge: Vec<Pos2> =
            self.samples.iter().zip(halves_px).map(|(s, half_px)| s.off_by(side * half_px)).collect();
        let mut n = 1;
        while let Some(turned) = (n..edge.len()).find(|&n| self.runs_back(&edge, n)) {
            let last = turned + MITRE_GAP_SAMPLES;
            let back =
                (turned..edge.len().min(last)).rev().find(|&n| self.runs_back(&edge, n)).unwrap_or(turned);
            n = back + 1;
            if let Some((from, to, meet)) = meeting(&edge, turned, back) {
                edge[from + 1..=to].fill(meet);
                n = n.max(to + 1);
            } else {
                // A leg shorter than what stands off it: the edge waits until it goes on.
                let wait = edge[turned - 1];
                edge[turned..=back].fill(wait);
            }
        }
        edge
    }

    /// Whether the piece of an edge that ends at a sample runs against the wire.
    fn runs_back(&self, edge: &[Pos2], n: usize) -> bool {
        (edge[n] - edge[n - 1]).dot(self.samples[n].at - self.samples[n - 1].at) < 0.0
    }

    fn ribbon_scale(&self) -> f32 {
        if self.peaks.current_a > 0.0 { self.size.ribbon_px / self.peaks.current_a } else { 0.0 }
    }

    fn whisker_scale(&self) -> f32 {
        if self.peaks.voltage_v > 0.0 { self.size.whisker_px / self.peaks.voltage_v } else { 0.0 }
    }

    /// A whisker's length, px; what goes far beyond the scale is cut short.
    fn whisker_px(&self, voltage_v: f32) -> f32 {
        let most_px = LONGEST_WHISKER * self.size.whisker_px;
        (voltage_v * self.whisker_scale()).clamp(-most_px, most_px)
    }

    /// The ribbon at a phase: as thick as the current is now.
    pub fn ribbon(&self, phase: Phase) -> Ribbon {
        let scale = self.ribbon_scale();
        self.ribbon_of(|s| s.current.now(phase).abs() * scale)
    }

    /// The ribbon at its thickest everywhere.
    pub fn current_envelope(&self) -> Ribbon {
        let scale = self.ribbon_scale();
        self.ribbon_of(|s| s.current.peak() * scale)
    }

    /// How far the whiskers reach, on both sides.
    pub fn voltage_envelope(&self) -> Ribbon {
        self.ribbon_of(|s| self.whisker_px(s.voltage.peak()))
    }

    /// The larger of both envelopes at each sample: what labels keep out of.
    pub fn outline(&self) -> Ribbon {
        let ribbon = self.ribbon_scale();
        self.ribbon_of(|s| (s.current.peak() * ribbon).max(self.whisker_px(s.voltage.peak())))
    }

    /// The whiskers at a phase, each from the wire to its tip.
    pub fn whiskers(&self, phase: Phase) -> Vec<[Pos2; 2]> {
        let whisker = |run_px: f32| {
            let s = self.sample(run_px);
            let length_px = self.whisker_px(s.voltage.now(phase));
            // Too short to be seen, or running into the whiskers of the wire's other leg.
            (self.seen.contains(s.at) && length_px.abs() > 0.7 && !s.crosses(length_px))
                .then(|| [s.at, s.off_by(length_px)])
        };
        self.spaced(WHISKER_GAP_PX).filter_map(whisker).collect()
    }

    /// The grain at a phase: chevrons that point the way the current flows and are carried along by it. They crowd
    /// where the charge is plus, and thin out where it is minus.
    pub fn grain(&self, phase: Phase) -> Vec<[Pos2; 3]> {
        let ribbon = self.ribbon_scale();
        let swing = if self.peaks.current_a > 0.0 { GRAIN_SWING_PX / self.peaks.current_a } else { 0.0 };
        let chevron = |rest_px: f32| {
            let run_px = rest_px + self.sample(rest_px).current.flowed(phase) * swing;
            let s = self.sample(run_px);
            let now = s.current.now(phase) * ribbon;
            if now.abs() < GRAIN_HALF_PX || !self.seen.contains(s.at) {
                return None;
            }
            // A quarter turn from the side of plus back to the direction of the wire's end.
            let forward = self.forward(run_px) * now.signum();
            let wing = s.off * (0.5 * now.abs()).min(7.0);
            let back = forward * (0.45 * now.abs()).clamp(1.5, 5.0);
            Some([s.at - back + wing, s.at + back, s.at - back - wing])
        };
        self.spaced(GRAIN_GAP_PX).filter_map(chevron).collect()
    }

    /// Evenly spaced places along the wire, as far from its beginning as from its end.
    fn spaced(&self, gap_px: f32) -> impl Iterator<Item = f32> {
        let length_px = self.step_px * (self.samples.len() - 1) as f32;
        let count = (length_px / gap_px).floor() as usize;
        let first_px = 0.5 * (length_px - count as f32 * gap_px);
        (0..=count).map(move |n| first_px + n as f32 * gap_px)
    }

    fn sample(&self, run_px: f32) -> Sample {
        let last = self.samples.len() - 1;
        let place = (run_px / self.step_px).clamp(0.0, last as f32);
        let before = (place as usize).min(last - 1);
        let (a, b, share) = (self.samples[before], self.samples[before + 1], place - before as f32);
        Sample {
            at: a.at.lerp(b.at, share),
            off: a.off + (b.off - a.off) * share,
            current: a.current.toward(b.current, share),
            voltage: a.voltage.toward(b.voltage, share),
            bend: if share < 0.5 { a.bend } else { b.bend },
        }
    }

    fn forward(&self, run_px: f32) -> Vec2 {
        (self.sample(run_px + SAMPLE_PX).at - self.sample(run_px - SAMPLE_PX).at).normalized()
    }
}

/// Where the edge before `turned` meets the one after `back`, and between which of its points: as far from the bend as
/// there is such a place.
fn meeting(edge: &[Pos2], turned: usize, back: usize) -> Option<(usize, usize, Pos2)> {
    let before = turned.saturating_sub(MITRE_SAMPLES)..turned;
    before.into_iter().find_map(|from| {
        let after = (turned..edge.len().min(back + MITRE_SAMPLES)).rev();
        // Neighbours share a point.
        after.filter(|&to| to > from + 2).find_map(|to| {
            let meet = crossing([edge[from], edge[from + 1]], [edge[to - 1], edge[to]])?;
            Some((from, to - 1, meet))
        })
    })
}

/// Where two straight pieces cross.
pub(super) fn crossing(a: [Pos2; 2], b: [Pos2; 2]) -> Option<Pos2> {
    let (along_a, along_b, between) = (a[1] - a[0], b[1] - b[0], b[0] - a[0]);
    let cross = |u: Vec2, v: Vec2| u.x * v.y - u.y * v.x;
    let slant = cross(along_a, along_b);
    let (share_a, share_b) = (cross(between, along_b) / slant, cross(between, along_a) / slant);
    let is_within = |share: f32| (0.0..=1.0).contains(&share);
    (is_within(share_a) && is_within(share_b)).then(|| a[0] + along_a * share_a)
}
