//! Page layout: sections flow down the pages, and their heads are repeated where they continue.

mod band_table;
mod block;
mod cautions;
mod cut_table;
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
use flow::{Flow, Section};

/// Lays the sheet out: what to build on the first page, how to work it on the second, more where it needs more.
pub(crate) fn lay_out(model: &SheetModel, plan: &Plan, hung: &Hung, request: &SheetRequest) -> Vec<Scene> {
    let mut flow = Flow::new(request.paper, &model.identity);
    let width_mm = flow.width_mm();
    let build = [
        cut_table::section(&model.cut_list, width_mm),
        feed_table::section(model, width_mm),
        cautions::section(&model.cautions, width_mm),
    ];
    let signed = records::signatures(width_mm);
    let taken_mm = build.iter().map(Section::height_mm).sum::<f64>() + signed.height_mm + space::CELL;
    let left_mm = flow.room_mm() - taken_mm;
    // Where all of it cannot be on one page, the drawing need not suffer.
    let height_mm = if left_mm < site::LEAST_HEIGHT_MM { site::WANTED_HEIGHT_MM } else { left_mm };
    let height_mm = height_mm.min(site::MOST_HEIGHT_MM);
    flow.place(site::section(plan, hung, request.units, Size { width_mm, height_mm }));
    for section in build {
        flow.place(section);
    }
    flow.place_at_foot(signed);
    flow.next_page();
    flow.place(band_table::section(model, width_mm));
    flow.place(records::measured(model, width_mm));
    if let Some(notes) = records::notes(width_mm, flow.room_mm()) {
        flow.place_at_foot(notes);
    }
    flow.finish()
}
