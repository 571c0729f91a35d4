use super::*;
use crate::sample;

/// Path of the sample: 50 m between two masts at 10 m.
fn hung(start_m: f64, cut_length_m: f64) -> Result<Hung, HangError> {
    let mut plan = sample::plan();
    plan.wires[0].start_m = start_m;
    plan.wires[0].cut_length_m = cut_length_m;
    hang(&plan)
}

#[test]
fn what_the_wire_leaves_of_the_path_is_rope() {
    let hung = hung(5.0, 40.0).unwrap();
    assert_eq!(hung.wires[0].vertices.len(), 2);
    assert!((hung.wires[0].length_m() - 40.0).abs() < 1e-12);
    assert_eq!(hung.ropes.len(), 2);
    assert!(hung.ropes.iter().all(|rope| (rope.length_m - 5.0).abs() < 1e-12));
    assert!((hung.feedpoint.at.x_m - 25.0).abs() < 1e-12 && (hung.feedpoint.arc_m - 20.0).abs() < 1e-12);
}

#[test]
fn what_does_not_fit_hangs_down() {
    let hung = hung(-3.0, 60.0).unwrap();
    let vertices = &hung.wires[0].vertices;
    assert_eq!(vertices.len(), 4);
    assert!((vertices[0].at.z_m - 7.0).abs() < 1e-12, "3 m hang from 10 m");
    assert!((vertices[3].at.z_m - 3.0).abs() < 1e-12, "7 m hang from 10 m");
    assert!((hung.wires[0].length_m() - 60.0).abs() < 1e-12);
    assert!(hung.ropes.is_empty());
}

#[test]
fn what_cannot_hang_says_so() {
    let low = hung(0.0, 61.0).unwrap_err().to_string();
    assert!(low.contains("its end would be -1.00 m over the earth"), "{low}");
    let beside = hung(51.0, 5.0).unwrap_err().to_string();
    assert!(beside.contains("beside its path of 50.00 m"), "{beside}");
    let mut plan = sample::plan();
    plan.wires[0].path[1] = PathPoint::OnSupport { support: "oak".to_owned(), height_m: 4.0 };
    let unknown = hang(&plan).unwrap_err().to_string();
    assert!(
        unknown.contains("wires[0].path[1].support") && unknown.contains("\"west mast\", \"east mast\""),
        "{unknown}"
    );
}
