use super::*;

#[test]
fn study() {
    for (l, e) in [(1.0, 0.3), (1.0, 0.9), (2.0, 0.5), (4.0, 0.5), (8.0, 0.3), (8.0, 0.9), (0.1, 0.5), (40.0, 0.5), (100.0, 0.1)] {
        let t = std::time::Instant::now();
        let a = Cylinder::new(l, e).unwrap();
        let dt = t.elapsed();
        let b = Cylinder::with_terms(l, e, 60, 30).unwrap();
        println!("{l} {e} {} {:e} {:e} {dt:?}", a.apparent(), a.apparent() - b.apparent(), a.apparent() - a.given_off());
    }
}
