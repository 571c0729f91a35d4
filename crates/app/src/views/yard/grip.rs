//! Grips: the things of the Yard that can be taken hold of, with their names and their numbers.

use station::plan::{Load, PathPoint, Point};

use super::model::Model;

/// Something that can be taken hold of.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
#[allow(missing_docs)] // The words say it; the fields are indices in the plan.
pub enum Grip {
    WireBeginning {
        wire: usize,
    },
    Feedpoint,
    WireEnd {
        wire: usize,
    },
    PathPoint {
        wire: usize,
        point: usize,
    },
    /// The middle of a span, where a new path point begins.
    NewPoint {
        wire: usize,
        span: usize,
    },
    SupportFoot {
        support: usize,
    },
    SupportTop {
        support: usize,
    },
    Entrance,
    /// A load, which slides along its wire.
    Load {
        load: usize,
    },
}

impl Grip {
    /// Whether it is the middle of a span, which shows itself only when the pointer is near.
    pub fn is_new_point(self) -> bool {
        matches!(self, Self::NewPoint { .. })
    }
}

/// The numbers of a grip, m: each grip has one or two.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub struct Numbers {
    /// Along the wire, or to the side.
    pub along_m: Option<f64>,
    /// Over the earth, or over the support's foot.
    pub up_m: Option<f64>,
}

impl Numbers {
    fn along(along_m: f64) -> Self {
        Self { along_m: Some(along_m), up_m: None }
    }

    fn up(up_m: f64) -> Self {
        Self { along_m: None, up_m: Some(up_m) }
    }

    fn both(along_m: f64, up_m: f64) -> Self {
        Self { along_m: Some(along_m), up_m: Some(up_m) }
    }
}

impl Model<'_> {
    /// All grips in the order of the Tab key.
    pub fn grips(&self) -> Vec<Grip> {
        let mut grips = Vec::with_capacity(24);
        for (wire, on) in self.plan.wires.iter().enumerate() {
            if self.paths.get(wire).is_none_or(Vec::is_empty) {
                continue;
            }
            let [begins, ends] = self.joined_ends(wire);
            if !begins {
                grips.push(Grip::WireBeginning { wire });
            }
            if self.plan.feedpoint.wire == wire {
                grips.push(Grip::Feedpoint);
            }
            let loads = self.plan.loads.iter().enumerate().filter(|(_, load)| load.wire == wire);
            grips.extend(loads.map(|(load, _)| Grip::Load { load }));
            if !ends {
                grips.push(Grip::WireEnd { wire });
            }
            let own = (0..on.path.len()).filter(|&point| !self.follows(wire, point));
            grips.extend(own.map(|point| Grip::PathPoint { wire, point }));
            grips.extend((1..on.path.len()).map(|end| Grip::NewPoint { wire, span: end - 1 }));
        }
        for support in 0..self.plan.site.supports.len() {
            grips.push(Grip::SupportTop { support });
            grips.push(Grip::SupportFoot { support });
        }
        grips.push(Grip::Entrance);
        grips
    }

    fn wire_name(&self, wire: usize) -> String {
        match self.plan.wires.as_slice() {
            [_] => "wire".to_owned(),
            wires => wires.get(wire).map_or_else(String::new, |w| w.name.clone()),
        }
    }

    /// The name that a screen reader says and a test asks for.
    pub fn name(&self, grip: Grip) -> String {
        let support_name =
            |support: usize| self.plan.site.supports.get(support).map_or("", |s| s.name.as_str());
        match grip {
            Grip::WireBeginning { wire } => format!("{} beginning", self.wire_name(wire)),
            Grip::WireEnd { wire } => format!("{} end", self.wire_name(wire)),
            Grip::Feedpoint => "feedpoint".to_owned(),
            Grip::PathPoint { wire, point } => self.point_name(wire, point),
            Grip::NewPoint { wire, span } => format!("new point in span {}{}", span + 1, self.of_wire(wire)),
            Grip::SupportFoot { support } => format!("support {}", support_name(support)),
            Grip::SupportTop { support } => format!("top of {}", support_name(support)),
            Grip::Entrance => "entrance".to_owned(),
            Grip::Load { load } => self.load_name(load),
        }
    }

    /// "load 7 MHz trap"; of two with one name, the second is numbered.
    fn load_name(&self, load: usize) -> String {
        let Some(found) = self.load(load) else { return String::new() };
        let before = self.plan.loads[..load].iter().filter(|other| other.name == found.name).count();
        if before == 0 {
            format!("load {}", found.name)
        } else {
            format!("load {} ({})", found.name, before + 1)
        }
    }

    /// " of arm 2", where there is more than one wire.
    fn of_wire(&self, wire: usize) -> String {
        match self.plan.wires.get(wire) {
            Some(found) if self.plan.wires.len() > 1 => format!(" of {}", found.name),
            _ => String::new(),
        }
    }

    /// A load of the plan.
    pub fn load(&self, load: usize) -> Option<&Load> {
        self.plan.loads.get(load)
    }

    fn point_name(&self, wire: usize, point: usize) -> String {
        let up = |index: usize| self.paths.get(wire).and_then(|path| path.get(index)).map(|v| v.at.z_m);
        let before = point.checked_sub(1).and_then(up);
        if let (Some(before), Some(here), Some(after)) = (before, up(point), up(point + 1))
            && here > before
            && here > after
        {
            return format!("apex{}", self.of_wire(wire));
        }
        match self.path_point(wire, point) {
            Some(PathPoint::OnSupport { support, .. }) => format!("{} on {support}", self.wire_name(wire)),
            _ => format!("free point {}{}", point + 1, self.of_wire(wire)),
        }
    }

    /// A point of a wire's path, as the plan has it.
    pub fn path_point(&self, wire: usize, point: usize) -> Option<&PathPoint> {
        self.plan.wires.get(wire)?.path.get(point)
    }

    /// Where a grip is in space.
    pub fn place(&self, grip: Grip) -> Option<Point> {
        let site = &self.plan.site;
        match grip {
            Grip::WireBeginning { wire } => self.hung_wire(wire)?.vertices.first().map(|v| v.at),
            Grip::WireEnd { wire } => self.hung_wire(wire)?.vertices.last().map(|v| v.at),
            Grip::Feedpoint => self.hung.as_ref().ok().map(|hung| hung.feedpoint.at),
            Grip::PathPoint { wire, point } => self.paths.get(wire)?.get(point).map(|v| v.at),
            Grip::NewPoint { wire, span } => {
                let path = self.paths.get(wire)?;
                Some(path.get(span)?.at.toward(path.get(span + 1)?.at, 0.5))
            }
            Grip::SupportFoot { support } => site.supports.get(support).map(|s| s.foot),
            Grip::SupportTop { support } => {
                site.supports.get(support).map(|s| Point { z_m: s.foot.z_m + s.height_m, ..s.foot })
            }
            Grip::Entrance => Some(site.entrance),
            Grip::Load { load } => {
                let load = self.load(load)?;
                let wire = self.hung_wire(load.wire)?;
                Some(wire.point_at(load.fraction * wire.length_m()))
            }
        }
    }

    /// The numbers of a grip as they are now.
    pub fn numbers(&self, grip: Grip) -> Numbers {
        let cut_m = |wire: usize| self.plan.wires.get(wire).map_or(0.0, |w| w.cut_length_m);
        match grip {
            Grip::WireBeginning { wire } | Grip::WireEnd { wire } => Numbers::along(cut_m(wire)),
            Grip::Feedpoint => {
                let feedpoint = self.plan.feedpoint;
                Numbers::along(feedpoint.fraction * cut_m(feedpoint.wire))
            }
            Grip::Load { load } => self
                .load(load)
                .map_or_else(Numbers::default, |load| Numbers::along(load.fraction * cut_m(load.wire))),
            Grip::PathPoint { wire, point } => match self.path_point(wire, point) {
                Some(PathPoint::OnSupport { height_m, .. }) => Numbers::up(*height_m),
                Some(PathPoint::Free(at)) => Numbers::both(self.distance_m(grip, *at), at.z_m),
                None => Numbers::default(),
            },
            Grip::SupportFoot { .. } => {
                self.place(grip).map_or_else(Numbers::default, |at| Numbers::along(self.distance_m(grip, at)))
            }
            Grip::SupportTop { support } => {
                let support = self.plan.site.supports.get(support);
                support.map_or_else(Numbers::default, |s| Numbers::up(s.height_m))
            }
            Grip::NewPoint { .. } | Grip::Entrance => self
                .place(grip)
                .map_or_else(Numbers::default, |at| Numbers::both(self.distance_m(grip, at), at.z_m)),
        }
    }

    /// The words for a grip's numbers, along and up.
    pub fn number_words(&self, grip: Grip) -> (String, &'static str) {
        let along = match grip {
            Grip::WireBeginning { .. } | Grip::WireEnd { .. } => "cut length".to_owned(),
            Grip::Feedpoint | Grip::Load { .. } => "from the beginning".to_owned(),
            _ => match self.datum(self.moves_first(grip)).name {
                name if name.is_empty() => "along".to_owned(),
                name => format!("from {name}"),
            },
        };
        (along, "height")
    }

    /// Whether moving a grip sideways moves the first path point, from which all else is counted.
    pub fn moves_first(&self, grip: Grip) -> bool {
        match grip {
            Grip::SupportFoot { support } => self.carries_ends(support) == (true, false),
            Grip::PathPoint { wire: 0, point: 0 } => true,
            _ => false,
        }
    }

    /// A point's horizontal distance from what its grip counts from, m.
    pub fn distance_m(&self, grip: Grip, at: Point) -> f64 {
        let datum = self.datum(self.moves_first(grip));
        (self.plane.flat(at).along_m - datum.along_m) * datum.side
    }

    /// One sentence on what a grip does.
    pub fn sentence(&self, grip: Grip) -> &'static str {
        match grip {
            Grip::WireBeginning { .. } | Grip::WireEnd { .. } => {
                "Drag to change the cut length; beyond the support the rest hangs down. Ctrl moves both ends, Alt \
                 leaves the grid."
            }
            Grip::Feedpoint => {
                "Drag along the wire; it stops at the centre, thirds, quarters and ends. Alt lets it go anywhere."
            }
            Grip::PathPoint { wire, point } => match self.path_point(wire, point) {
                Some(PathPoint::OnSupport { .. }) => {
                    "Drag up or down: how high the wire is held on its support."
                }
                _ => {
                    "Drag anywhere; onto a support to make it fast there, back into line or Delete to take it away."
                }
            },
            Grip::NewPoint { .. } => "Drag up, down or onto a support to bend the wire here.",
            Grip::SupportFoot { .. } => "Drag sideways to move the support with everything made fast to it.",
            Grip::SupportTop { .. } => {
                "Drag up or down to change the support's height; what is at its top follows."
            }
            Grip::Load { .. } => {
                "Drag along the wire; its values are in the Station view. Delete takes it away, Alt leaves the grid."
            }
            Grip::Entrance => "Where the feed line enters the station: drag it to its place.",
        }
    }
}
