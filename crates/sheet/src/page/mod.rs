//! Page layout: sections flow down the pages, and their heads are repeated where they continue.

mod band_table;
mod block;
mod cautions;
mod cut_table;
mod density;
mod feed_table;
mod flow;
mod furniture;
mod records;
mod site;
mod swr_curve;

use station::hang::Hung;
use station::plan::Plan;

use crate::drawing::Size;
use crate::model::SheetModel;
use crate::request::SheetRequest;
use crate::scene::Scene;
use crate::tokens::space;
use block::Block;
use density::Density;
use flow::Flow;

/// Pages of a sheet that is not a long one.
const WANTED_PAGES: usize = 2;

/// Lays the sheet out: what to build on the first page, how to work it on the second, more where it needs more. Where
/// that saves a page, things move closer and what need not stand on the first page moves to the second.
pub(crate) fn lay_out(model: &SheetModel, plan: &Plan, hung: &Hung, request: &SheetRequest) -> Vec<Scene> {
    let source = Source { model, plan, hung, request };
    let tries = [
        (Density::ROOMY, site::LEAST_HEIGHT_MM),
        (Density::DENSE, site::READABLE_HEIGHT_MM),
        (Density::DENSE, site::LEAST_HEIGHT_MM),
    ];
    tries
        .into_iter()
        .flat_map(|(density, least_mm)| FirstPage::ALL.map(|first| (density, first, least_mm)))
        .filter_map(|(density, first, least_mm)| source.pages(&density, first, least_mm))
        .find(|pages| pages.len() <= WANTED_PAGES)
        .or_else(|| source.pages(&Density::ROOMY, FirstPage::Build, 0.0))
        .unwrap_or_default()
}

/// What stands on the first page below the site, the cut list and the feeds.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
enum FirstPage {
    /// Cautions and signatures.
    Everything,
    /// Cautions.
    Cautions,
    /// The cautions that hold for every station.
    GeneralCautions,
    /// Nothing more.
    Build,
}

impl FirstPage {
    const ALL: [Self; 4] = [Self::Everything, Self::Cautions, Self::GeneralCautions, Self::Build];
}

/// What a sheet is made from.
struct Source<'a> {
    model: &'a SheetModel,
    plan: &'a Plan,
    hung: &'a Hung,
    request: &'a SheetRequest,
}

impl Source<'_> {
    /// The pages; nothing where the site drawing would be lower than `least_mm`.
    fn pages(&self, density: &Density, first: FirstPage, least_mm: f64) -> Option<Vec<Scene>> {
        let Self { model, plan, hung, request } = *self;
        let mut flow = Flow::new(request.paper, &model.identity, *density);
        let width_mm = flow.width_mm();
        let build = [
            cut_table::section(&model.cut_list, density, width_mm),
            feed_table::section(model, density, width_mm),
        ];
        let cautions = match first {
            FirstPage::GeneralCautions => cautions::divided(&model.cautions, density, width_mm),
            _ => cautions::section(&model.cautions, density, width_mm),
        };
        let signed = records::signatures(density, width_mm);
        let build_mm: f64 = build.iter().map(|section| section.height_mm() + density.section).sum();
        let below_mm = match first {
            FirstPage::Everything => cautions.height_mm() + density.section + signed.height_mm + space::CELL,
            FirstPage::Cautions => cautions.height_mm() + density.section,
            FirstPage::GeneralCautions => cautions.least_height_mm() + density.section,
            FirstPage::Build => 0.0,
        };
        let mut height_mm = flow.room_mm() - build_mm - below_mm - density.section;
        if first == FirstPage::Build {
            // What does not fit continues on the next page.
            height_mm = height_mm.max(site::WANTED_HEIGHT_MM);
        }
        if height_mm < least_mm {
            return None;
        }
        let height_mm = height_mm.min(site::MOST_HEIGHT_MM);
        flow.place(site::section(plan, hung, request.units, Size { width_mm, height_mm }));
        for section in build {
            flow.place(section);
        }
        flow.place(cautions);
        let foot = if first == FirstPage::Everything {
            flow.place_at_foot(signed);
            None
        } else {
            Some(signed)
        };
        if flow.is_on_first_page() {
            flow.next_page();
        }
        flow.place(band_table::section(model, density, width_mm));
        flow.place(records::measured(model, density, width_mm));
        place_notes(&mut flow, foot);
        Some(flow.finish())
    }
}

/// A box for notes where there is room for one, over what stands at the foot of the last page.
fn place_notes(flow: &mut Flow<'_>, foot: Option<Block>) {
    let width_mm = flow.width_mm();
    let foot_mm = foot.as_ref().map_or(0.0, |foot| foot.height_mm + space::CELL);
    let mut blocks = records::notes(width_mm, flow.room_mm() - foot_mm).into_iter().chain(foot);
    let Some(mut whole) = blocks.next() else { return };
    for block in blocks {
        let down_mm = whole.height_mm + space::CELL;
        whole.height_mm = down_mm + block.height_mm;
        whole.add(block, 0.0, down_mm);
    }
    flow.place_at_foot(whole);
}
