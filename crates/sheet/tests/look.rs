//! Writes the fixtures' sheets for looking at: `cargo test -p sheet --test look -- --ignored`, then see /tmp/sheet.

mod support;

#[test]
#[ignore = "writes files to look at; checks nothing"]
fn write_all() {
    let folder = std::path::Path::new("/tmp/sheet");
    std::fs::create_dir_all(folder).unwrap();
    for station in support::stations() {
        for request in support::requests() {
            let name =
                format!("{}-{:?}-{:?}.pdf", station.name.replace(' ', "-"), request.paper, request.units);
            let pdf = sheet::pdf_for(&station.plan, &station.report, &request).unwrap();
            std::fs::write(folder.join(name), pdf).unwrap();
        }
    }
}
