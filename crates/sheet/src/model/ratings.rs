//! What the parts of a feed are called and rated for.

use station::catalogue;
use station::plan::{LineChoice, Link};

/// Highest peak voltage that a link may have across it, V, where a figure is known.
pub(super) fn rating_peak_v(link: &Link) -> Option<f64> {
    match link {
        Link::Transformer(_) => None,
        Link::Line(piece) => catalogue::line(&piece.line).ok().and_then(|data| data.rating_peak_v),
        Link::MatchingUnit(unit) => unit.rating_peak_v,
    }
}

/// The name of a line, as the crew reads it on the drum; its id where the catalogue does not have it.
pub(super) fn line_name(choice: &LineChoice) -> String {
    match (catalogue::line(choice), choice) {
        (Ok(data), _) => data.name.clone(),
        (Err(_), LineChoice::Own(data)) => data.name.clone(),
        (Err(_), LineChoice::Catalogue(id)) => id.clone(),
    }
}
