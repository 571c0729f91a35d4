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
        let request = support::requests()[0];
        let pages = sheet::lay_out(&station.plan, &station.report, &request).unwrap();
        let name = station.name.replace(' ', "-");
        std::fs::write(folder.join(format!("{name}.svg")), sheet::svg::write(&pages[0])).unwrap();
        std::fs::write(folder.join(format!("{name}.skia.png")), sheet::png::write(&pages[0], 90.0).unwrap())
            .unwrap();
    }
}
