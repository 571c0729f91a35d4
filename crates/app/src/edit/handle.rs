//! What a hand holds while it drags.

use std::mem::Discriminant;

use station::plan::Earth;

use crate::command::Edit;

/// What an edit takes hold of: edits of one handle in a row are one step of undo until the hand lets go.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Handle {
    kind: Discriminant<Edit>,
    of: usize,
    part: usize,
}

impl Handle {
    /// The handle of an edit; `None` for edits that are steps of their own.
    #[must_use]
    pub fn of(edit: &Edit) -> Option<Self> {
        let (of, part) = match edit {
            Edit::WireBeginning { wire, .. }
            | Edit::CutLength { wire, .. }
            | Edit::WireSpan { wire, .. }
            | Edit::PathPoints { wire, .. } => (*wire, 0),
            Edit::PathHeight { wire, point, .. } => (*wire, *point),
            Edit::SupportFoot { support, .. } | Edit::SupportHeight { support, .. } => (*support, 0),
            Edit::LinkLength { feed, link, .. } | Edit::SetLink { feed, link, .. } => (*feed, *link),
            Edit::LoadFraction { load, .. } | Edit::SetLoad { load, .. } => (*load, 0),
            Edit::RenameWire { wire, .. } | Edit::Earthing { wire, .. } => (*wire, 0),
            Edit::RenameFeed { feed, .. } => (*feed, 0),
            Edit::RenameSupport { support, .. } => (*support, 0),
            Edit::FeedFraction(_)
            | Edit::Earth(Earth::Own(_))
            | Edit::Entrance(_)
            | Edit::Transmitter(_)
            | Edit::Bands(_)
            | Edit::Name(_)
            | Edit::Purpose(_)
            | Edit::CallSign(_)
            | Edit::Edition(_)
            | Edit::LeastShare(_) => (0, 0),
            Edit::Conductor { .. }
            | Edit::AddWire(_)
            | Edit::AddArms { .. }
            | Edit::RemoveWire { .. }
            | Edit::AddLoad(_)
            | Edit::RemoveLoad { .. }
            | Edit::Earth(_)
            | Edit::AddSupport(_)
            | Edit::RemoveSupport { .. }
            | Edit::SupportKind { .. }
            | Edit::LineKind { .. }
            | Edit::InsertLink { .. }
            | Edit::RemoveLink { .. }
            | Edit::AddFeed(_)
            | Edit::CopyFeed { .. }
            | Edit::RemoveFeed { .. }
            | Edit::Whole(_) => return None,
        };
        Some(Self { kind: std::mem::discriminant(edit), of, part })
    }
}
