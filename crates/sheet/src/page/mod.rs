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
use block::Block;
use flow::{Flow, Section};

/// Lays the sheet out: what to build on the first page, how to work it on the second, more where it needs more.
pub(crate) fn lay_out(model: &SheetModel, plan: &Plan, hung: &Hung, request: &SheetRequest) -> Vec<Scene> {
    let mut flow = Flow::new(request.paper, &model.identity);
    let width_mm = flow.width_mm();
    let build = [cut_table::section(&model.cut_list, width_mm), feed_table::section(model, width_mm)];
    let cautions = cautions::section(&model.cautions, width_mm);
    let signed = records::signatures(width_mm);
    let build_mm = build.iter().map(Section::height_mm).sum::<f64>();
    let left_mm = flow.room_mm() - build_mm - cautions.height_mm() - signed.height_mm - space::CELL;
    let is_on_one_page = left_mm >= site::LEAST_HEIGHT_MM;
    // Where cautions and signatures go to the next page, the drawing need not suffer.
    let height_mm =
        if is_on_one_page { left_mm } else { (flow.room_mm() - build_mm).max(site::WANTED_HEIGHT_MM) };
    let height_mm = height_mm.min(site::MOST_HEIGHT_MM);
    flow.place(site::section(plan, hung, request.units, Size { width_mm, height_mm }));
    for section in build {
        flow.place(section);
    }
    flow.place(cautions);
    let foot = if is_on_one_page {
        flow.place_at_foot(signed);
        None
    } else {
        Some(signed)
    };
    if flow.is_on_first_page() {
        flow.next_page();
    }
    flow.place(band_table::section(model, width_mm));
    flow.place(records::measured(model, width_mm));
    place_notes(&mut flow, foot);
    flow.finish()
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
