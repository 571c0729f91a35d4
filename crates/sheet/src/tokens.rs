//! Named inks, strokes, text styles and spacings, shared by paper and screen. No other place names a colour, a line
//! width or a type size of the sheet.

/// What the drawing stands on.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Ground {
    /// The window by day.
    Light,
    /// The window by night.
    Dark,
    /// White paper.
    Paper,
}

/// A colour by its role.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
#[allow(missing_docs)] // The words say it.
pub enum Ink {
    /// What everything lies on.
    Background,
    /// Panels, table heads, boxes.
    Panel,
    /// A control at rest; a step off the panel.
    Raised,
    /// Text and the main lines.
    Text,
    /// Secondary text, rulers.
    Faint,
    /// Hairlines, grids, table rules.
    Rule,
    /// What is chosen or has the focus.
    Chosen,
    /// Earth below the site.
    Earth,
    /// Masts, trees, buildings.
    Support,
    Wire,
    Rope,
    /// Current: the ribbon, its numbers.
    Current,
    /// Voltage: the whiskers, their numbers.
    Voltage,
    /// First, second, third feed (also told apart by line style and letter).
    FeedA,
    FeedB,
    FeedC,
    /// Resistance and reactance curves.
    Resistance,
    Reactance,
    /// The transmitter's limit in plots.
    Limit,
    /// Verdicts, from best to worst.
    Works,
    WorksWithUnit,
    TooLossy,
    Overstressed,
    OutOfRange,
    /// Cautions and warnings.
    Caution,
}

impl Ink {
    /// sRGB, 8 bits a channel.
    #[must_use]
    pub fn rgb(self, ground: Ground) -> [u8; 3] {
        let (light, dark, paper) = self.hex();
        let value = match ground {
            Ground::Light => light,
            Ground::Dark => dark,
            Ground::Paper => paper,
        };
        [(value >> 16) as u8, (value >> 8) as u8, value as u8]
    }

    /// Light, dark, paper. Feeds are blue, ochre and green of different lightness, so that they stay apart in grey
    /// and for colour-blind eyes.
    fn hex(self) -> (u32, u32, u32) {
        match self {
            Self::Background => (0xf7_f5_f0, 0x15_1b_1f, 0xff_ff_ff),
            Self::Panel => (0xec_e8_df, 0x1e_26_2b, 0xf0_ee_e9),
            Self::Raised => (0xdf_da_ce, 0x2c_37_3d, 0xe4_e1_da),
            Self::Text => (0x1c_26_2c, 0xea_e6_dc, 0x00_00_00),
            Self::Faint => (0x5c_67_6c, 0x9c_a7_aa, 0x4a_4a_4a),
            Self::Rule => (0xcb_c5_b8, 0x3a_46_4d, 0xa8_a8_a8),
            Self::Chosen => (0x0f_6b_8f, 0x5c_b8_d6, 0x00_00_00),
            Self::Earth => (0xd9_cf_b8, 0x33_2e_26, 0xe6_e2_d8),
            Self::Support => (0x6b_57_42, 0xb4_9d_82, 0x3c_3c_3c),
            Self::Wire => (0x26_2a_2c, 0xf2_ed_e2, 0x00_00_00),
            Self::Rope => (0x8a_83_70, 0x8f_8b_7c, 0x70_70_70),
            Self::Current => (0xb3_48_26, 0xf0_8a_5d, 0x9c_3a_1a),
            Self::Voltage => (0x5b_45_a8, 0xa9_97_f0, 0x4a_36_92),
            Self::FeedA => (0x1d_5f_a3, 0x6c_b0_f0, 0x14_4f_8c),
            Self::FeedB => (0x8f_63_00, 0xe8_b9_45, 0x9a_6a_00),
            Self::FeedC => (0x2f_63_40, 0x86_c8_98, 0x2f_66_40),
            Self::Resistance => (0x2b_35_3a, 0xe0_db_cf, 0x10_10_10),
            Self::Reactance => (0x6c_61_80, 0xb7_aa_cc, 0x6a_60_7a),
            Self::Limit => (0xb4_1e_3c, 0xff_7a_90, 0xa0_10_30),
            Self::Works => (0x1f_70_46, 0x6c_cf_94, 0x1a_63_3c),
            Self::WorksWithUnit => (0x2a_6a_7e, 0x74_bf_d4, 0x22_5f_74),
            Self::TooLossy => (0x8f_5a_00, 0xe8_ab_4a, 0x8a_55_00),
            Self::Overstressed => (0xb0_3c_1e, 0xff_8d_66, 0x94_2c_12),
            Self::OutOfRange => (0xa0_1e_44, 0xff_80_9c, 0x86_12_34),
            Self::Caution => (0x9c_4b_00, 0xff_b2_5c, 0x8a_40_00),
        }
    }

    /// The ink of a feed, by its index in the plan.
    #[must_use]
    pub fn feed(index: usize) -> Self {
        [Self::FeedA, Self::FeedB, Self::FeedC][index % 3]
    }
}

/// How heavy a line is, by its role.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub enum Pen {
    /// Grids, rules, rims of boxes.
    Hairline,
    /// Curves of the second rank: voltage in a thumbnail, what the matching unit makes of it.
    Fine,
    /// Curves.
    Curve,
    /// What is chosen; the tip of a bar.
    Bold,
}

impl Pen {
    /// Width in points of the screen; a sheet scales it.
    #[must_use]
    pub fn width(self) -> f32 {
        match self {
            Self::Hairline => 1.0,
            Self::Fine => 1.2,
            Self::Curve => 1.7,
            Self::Bold => 2.5,
        }
    }
}

/// Whether a line is drawn through, so that feeds stay apart without colour.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
#[allow(missing_docs)] // The words say it.
pub enum Pattern {
    Solid,
    Dashed,
    Dotted,
}

impl Pattern {
    /// The pattern of a feed, by its index in the plan.
    #[must_use]
    pub fn feed(index: usize) -> Self {
        [Self::Solid, Self::Dashed, Self::Dotted][index % 3]
    }

    /// Lengths of dash and gap in points of the screen; `None` for a line drawn through.
    #[must_use]
    pub fn dash_and_gap(self) -> Option<(f32, f32)> {
        match self {
            Self::Solid => None,
            Self::Dashed => Some((6.0, 3.5)),
            Self::Dotted => Some((1.5, 3.0)),
        }
    }
}

/// A line by its role. Widths hold for paper at full size.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub enum Stroke {
    /// Grids and hatching.
    Hair,
    /// Table rules, dimension lines.
    Rule,
    /// Boxes that someone writes in, section heads.
    Frame,
    /// Antenna wire.
    Wire,
    /// Rope.
    Rope,
    /// Masts, trunks, walls.
    Support,
    /// The earth's surface.
    Earth,
    /// First, second, third feed in drawings and curves: solid, dashed, dotted.
    FeedA,
    /// See [`Stroke::FeedA`].
    FeedB,
    /// See [`Stroke::FeedA`].
    FeedC,
    /// The transmitter's limit.
    Limit,
}

impl Stroke {
    /// Width, mm.
    #[must_use]
    pub fn width_mm(self) -> f64 {
        match self {
            Self::Hair => 0.12,
            Self::Rule | Self::Limit => 0.2,
            Self::Frame => 0.3,
            Self::Rope | Self::Earth => 0.35,
            Self::FeedA | Self::FeedB | Self::FeedC => 0.45,
            Self::Wire => 0.7,
            Self::Support => 0.9,
        }
    }

    /// Lengths of dashes and gaps in turn, mm; empty for a solid line.
    #[must_use]
    pub fn dash_mm(self) -> &'static [f64] {
        match self {
            Self::Rope => &[0.9, 0.6],
            Self::FeedB => &[1.8, 0.8],
            Self::FeedC => &[0.5, 0.8],
            Self::Limit => &[0.6, 0.4],
            _ => &[],
        }
    }

    /// The line of a feed, by its index in the plan.
    #[must_use]
    pub fn feed(index: usize) -> Self {
        [Self::FeedA, Self::FeedB, Self::FeedC][index % 3]
    }
}

/// Weight of the type.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
#[allow(missing_docs)] // The words say it.
pub enum Weight {
    Regular,
    Bold,
}

/// Type by its role on paper.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub enum TextStyle {
    /// The plan's name.
    Title,
    /// Heads of sections.
    Section,
    /// The numbers that someone cuts or sets by.
    Key,
    /// What stands out in a table or a sentence.
    Strong,
    /// Everything else that is read.
    Body,
    /// Column heads, scales, footnotes.
    Note,
}

impl TextStyle {
    /// All styles.
    pub const ALL: [Self; 6] = [Self::Title, Self::Section, Self::Key, Self::Strong, Self::Body, Self::Note];

    /// Size, points (1/72 inch).
    #[must_use]
    pub fn size_pt(self) -> f64 {
        match self {
            Self::Title => 20.0,
            Self::Section | Self::Key => 11.5,
            Self::Strong | Self::Body => 9.0,
            Self::Note => 8.0,
        }
    }

    /// Size, mm.
    #[must_use]
    pub fn size_mm(self) -> f64 {
        self.size_pt() * MM_PER_POINT
    }

    /// Distance between base lines, mm.
    #[must_use]
    pub fn leading_mm(self) -> f64 {
        self.size_mm() * 1.16
    }

    /// Weight.
    #[must_use]
    pub fn weight(self) -> Weight {
        match self {
            Self::Title | Self::Section | Self::Key | Self::Strong => Weight::Bold,
            Self::Body | Self::Note => Weight::Regular,
        }
    }
}

/// Millimetres in a point.
pub const MM_PER_POINT: f64 = 25.4 / 72.0;

/// Distances on paper, mm.
pub mod space {
    /// Paper's edge to the text: printers reach it, and a hole punch misses it.
    pub const MARGIN: f64 = 12.0;
    /// Between sections.
    pub const SECTION: f64 = 3.0;
    /// Between columns of text.
    pub const GUTTER: f64 = 5.0;
    /// Between a rule and the text at it, and between text and the edge of its cell.
    pub const CELL: f64 = 1.0;
}
