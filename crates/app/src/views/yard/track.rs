//! A wire's line on the screen: positions by pixels run along it, the side of plus, and its bends.

use eframe::egui::{Pos2, Vec2, vec2};
use station::hang::HungWire;

use super::side_view::SideView;

/// A bend is rounded for ribbon and whiskers over this length on either side, px.
const ROUNDING_PX: f32 = 7.0;

/// A bend of the wire, seen from a place nearby: on its inner side what stands off one leg must not run into what
/// stands off the other.
#[derive(Clone, Copy, Debug)]
pub struct NearBend {
    /// 1 where the inner side is the side of plus, −1 otherwise.
    pub side: f32,
    /// How far from the wire the bisector is at this place, px.
    pub room_px: f32,
}

/// The wire's line on the screen, measured in pixels.
pub struct Track {
    corners: Vec<(Pos2, f64)>,
    runs_px: Vec<f32>,
    /// 1 or −1, so that plus is up on a wire that runs to the right or to the left.
    side: f32,
}

impl Track {
    /// `None` for a wire that is a dot on the screen.
    pub fn of(view: &SideView, wire: &HungWire) -> Option<Self> {
        let corners: Vec<(Pos2, f64)> = wire.vertices.iter().map(|v| (view.at(v.at), v.arc_m)).collect();
        let mut runs_px = Vec::with_capacity(corners.len());
        let mut run_px = 0.0;
        for (n, (at, _)) in corners.iter().enumerate() {
            if n > 0 {
                run_px += corners[n - 1].0.distance(*at);
            }
            runs_px.push(run_px);
        }
        let (first, last) = (corners.first()?.0, corners.last()?.0);
        let side = if last.x < first.x - 0.5 { -1.0 } else { 1.0 };
        (run_px > 1.0 && wire.length_m() > 0.0).then_some(Self { corners, runs_px, side })
    }

    /// All of it.
    pub fn length_px(&self) -> f32 {
        self.runs_px[self.runs_px.len() - 1]
    }

    /// Position and arc at a distance along the line.
    pub fn at(&self, run_px: f32) -> (Pos2, f64) {
        let run_px = run_px.clamp(0.0, self.length_px());
        let after = self.runs_px.partition_point(|&r| r < run_px).clamp(1, self.runs_px.len() - 1);
        let ((from, from_m), (to, to_m)) = (self.corners[after - 1], self.corners[after]);
        let piece_px = self.runs_px[after] - self.runs_px[after - 1];
        let share = if piece_px > 0.0 { (run_px - self.runs_px[after - 1]) / piece_px } else { 0.0 };
        (from.lerp(to, share), from_m + f64::from(share) * (to_m - from_m))
    }

    /// The distance along the line of an arc.
    pub fn run_px(&self, arc_m: f64) -> f32 {
        let after = self.corners.partition_point(|c| c.1 < arc_m).clamp(1, self.corners.len() - 1);
        let (from_m, to_m) = (self.corners[after - 1].1, self.corners[after].1);
        let share = if to_m > from_m { ((arc_m - from_m) / (to_m - from_m)).clamp(0.0, 1.0) } else { 0.0 };
        self.runs_px[after - 1] + share as f32 * (self.runs_px[after] - self.runs_px[after - 1])
    }

    /// Away from the line on the side of plus; bends are rounded.
    pub fn off(&self, run_px: f32) -> Vec2 {
        let chord = self.at(run_px + ROUNDING_PX).0 - self.at(run_px - ROUNDING_PX).0;
        let along = chord.normalized();
        vec2(along.y, -along.x) * self.side
    }

    /// The nearest bend that is sharp enough to matter.
    pub fn bend(&self, run_px: f32) -> Option<NearBend> {
        let inner = 1..self.corners.len() - 1;
        let nearest = inner
            .min_by(|&a, &b| (self.runs_px[a] - run_px).abs().total_cmp(&(self.runs_px[b] - run_px).abs()))?;
        let corner = self.corners[nearest].0;
        let before = (corner - self.corners[nearest - 1].0).normalized();
        let after = (self.corners[nearest + 1].0 - corner).normalized();
        // The legs lie at the inner angle θ: cos θ = −before·after.
        let cos = -before.dot(after);
        let (sine, cosine) = ((0.5 * (1.0 - cos)).max(0.0).sqrt(), (0.5 * (1.0 + cos)).max(0.0).sqrt());
        if cosine < 0.05 || sine < 0.2 {
            return None;
        }
        let away_px = run_px - self.runs_px[nearest];
        let along = if away_px < 0.0 { before } else { after };
        let off = vec2(along.y, -along.x) * self.side;
        let inward = (after - before).normalized();
        Some(NearBend { side: off.dot(inward).signum(), room_px: away_px.abs() * sine / cosine })
    }
}
