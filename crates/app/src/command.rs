//! What the views ask for. Drawing returns commands; the document is the one place that changes the plan.

use station::plan::{
    Band, ConductorChoice, Earth, EarthConnection, Feed, LineChoice, Link, Load, PathPoint, Plan, Point,
    Support, SupportKind, Transmitter, Wire,
};
use station::units::Units;

/// Something a view or a key asks for.
#[derive(Clone, Debug, PartialEq)]
pub enum Command {
    /// Change the plan.
    Edit(Edit),
    /// The hand let go: what comes next is a new step of undo.
    EndOfDrag,
    /// Step back.
    Undo,
    /// Step forward again.
    Redo,
    /// Look at something else.
    Show(Show),
    /// Files and the program itself.
    Desk(Desk),
}

/// A change of the plan, small and absolute: the new value, never a difference.
#[derive(Clone, Debug, PartialEq)]
#[allow(missing_docs)] // Field names carry the units and the plan's own words.
pub enum Edit {
    /// Move one end of a wire along its path; the cut length follows, the other end stays.
    WireBeginning {
        wire: usize,
        start_m: f64,
    },
    CutLength {
        wire: usize,
        cut_length_m: f64,
    },
    /// Cut length and where it begins in one step.
    WireSpan {
        wire: usize,
        start_m: f64,
        cut_length_m: f64,
    },
    /// Height of one path point over its support's foot (or over earth for a free point).
    PathHeight {
        wire: usize,
        point: usize,
        height_m: f64,
    },
    /// Replace the whole path: points added, moved sideways, made fast to another support, or taken away.
    PathPoints {
        wire: usize,
        path: Vec<PathPoint>,
    },
    Conductor {
        wire: usize,
        conductor: ConductorChoice,
    },
    AddWire(Wire),
    /// Two more wires, one from either side of the feedpoint, slanting down under the fed wire: a fan. The fed wire
    /// gets two path points there, and they are joined to it.
    AddArms {
        length_m: f64,
    },
    /// Its loads go with it. Refused for the wire that is fed.
    RemoveWire {
        wire: usize,
    },
    RenameWire {
        wire: usize,
        name: String,
    },
    /// What connects a wire's ends to the earth.
    Earthing {
        wire: usize,
        earthed: Vec<EarthConnection>,
    },
    FeedFraction(f64),
    AddLoad(Load),
    RemoveLoad {
        load: usize,
    },
    SetLoad {
        load: usize,
        with: Load,
    },
    /// Slide a load along its wire.
    LoadFraction {
        load: usize,
        fraction: f64,
    },
    /// Move a support; wires on it follow.
    SupportFoot {
        support: usize,
        foot: Point,
    },
    /// Height of a support. What is made fast at its top (within 5 cm) follows the top; nothing is left above it.
    SupportHeight {
        support: usize,
        height_m: f64,
    },
    AddSupport(Support),
    /// Refused while a wire hangs on it.
    RemoveSupport {
        support: usize,
    },
    /// The wires that hang on it follow the new name.
    RenameSupport {
        support: usize,
        name: String,
    },
    SupportKind {
        support: usize,
        kind: SupportKind,
    },
    Earth(Earth),
    Entrance(Point),
    LinkLength {
        feed: usize,
        link: usize,
        length_m: f64,
    },
    LineKind {
        feed: usize,
        link: usize,
        line: LineChoice,
    },
    SetLink {
        feed: usize,
        link: usize,
        with: Link,
    },
    InsertLink {
        feed: usize,
        link: usize,
        new: Link,
    },
    RemoveLink {
        feed: usize,
        link: usize,
    },
    AddFeed(Feed),
    CopyFeed {
        feed: usize,
    },
    RemoveFeed {
        feed: usize,
    },
    RenameFeed {
        feed: usize,
        name: String,
    },
    Transmitter(Transmitter),
    Bands(Vec<Band>),
    Name(String),
    Purpose(String),
    CallSign(String),
    /// What the sheet prints as its edition.
    Edition(String),
    /// Smallest share of the watts that must reach the wire.
    LeastShare(f64),
    /// Replace everything (open a file, paste).
    Whole(Box<Plan>),
}

/// What is looked at. Not part of the plan, not undone.
#[derive(Clone, Debug, PartialEq)]
#[allow(missing_docs)] // The words say it.
pub enum Show {
    View(View),
    Band(usize),
    Feed(usize),
    Units(Units),
    Theme(Theme),
    /// The RF cycle of the standing wave.
    Motion(Motion),
    Paper(sheet::Paper),
}

/// The views, by the names on their tabs.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
#[allow(missing_docs)] // The words say it.
pub enum View {
    #[default]
    Yard,
    Band,
    Sheet,
    Station,
}

/// Light, dark, or what the desktop says.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq, serde::Serialize, serde::Deserialize)]
#[allow(missing_docs)] // The words say it.
pub enum Theme {
    #[default]
    Desktop,
    Light,
    Dark,
}

/// How the standing wave moves.
#[derive(Clone, Copy, Debug, PartialEq)]
#[allow(missing_docs)] // The words say it.
pub enum Motion {
    Run,
    Stop,
    /// Set the phase of the RF cycle, degrees; stops it.
    Phase(f64),
    /// Seconds on screen for one RF cycle.
    Period(f64),
}

/// Files and the program.
#[derive(Clone, Debug, PartialEq)]
#[allow(missing_docs)] // The words say it.
pub enum Desk {
    NewPlan,
    Open,
    OpenPath(std::path::PathBuf),
    Save,
    SaveAs,
    SaveSheet,
    PrintSheet,
    Quit,
    Help,
}
