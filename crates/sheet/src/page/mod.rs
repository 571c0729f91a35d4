//! Page layout: sections flow down the pages, and their heads are repeated where they continue.

mod band_table;
mod block;
mod cautions;
mod cut_table;
mod feed_table;
mod flow;
mod furniture;
mod records;
mod swr_curve;

use crate::drawing;
use crate::model::SheetModel;
use crate::request::SheetRequest;
use crate::scene::Scene;
pub(crate) use block::Block;
use flow::Flow;
pub(crate) use flow::Section;
use station::hang::Hung;
use station::plan::Plan;

/// Lays the sheet out: what to build on the first page, how to work it on the second, more where it needs more.
pub(crate) fn lay_out(model: &SheetModel, plan: &Plan, hung: &Hung, request: &SheetRequest) -> Vec<Scene> {
    let mut flow = Flow::new(request.paper, &model.identity);
    let width_mm = flow.width_mm();
    let build = [
        cut_table::section(&model.cut_list, width_mm),
        feed_table::section(&model.feeds, &model.identity, width_mm),
        cautions::section(&model.cautions, width_mm),
        records::signatures(width_mm),
    ];
    let taken_mm: f64 = build.iter().map(Section::height_mm).sum();
    let drawing_mm = (flow.room_mm() - taken_mm).clamp(drawing::LEAST_HEIGHT_MM, drawing::MOST_HEIGHT_MM);
    flow.place(drawing::section(plan, hung, request.units, width_mm, drawing_mm));
    for section in build {
        flow.place(section);
    }
    flow.next_page();
    flow.place(band_table::section(model, width_mm));
    for section in records::sections(model, width_mm) {
        flow.place(section);
    }
    flow.finish()
}
