use super::*;

#[test]
fn look() {
    for ratio in [0.1, 0.5, 1.0, 2.0, 4.0, 10.0, 20.0, 40.0] {
        let t0 = std::time::Instant::now();
        let a = Tunnel::new(Section::disc(1.0).unwrap(), ratio).unwrap();
        let dt = t0.elapsed();
        let b = Tunnel::with_terms(Section::disc(1.0).unwrap(), ratio, 40).unwrap();
        println!("disc {ratio} {} {:e} {:?} n {} J0 {}", a.transmitted(), a.transmitted() - b.transmitted(), dt, a.terms.len(), a.exitance(0.0)-b.exitance(0.0));
    }
    for ratio in [0.05, 0.25, 1.0, 5.0, 10.0, 20.0] {
        let a = Tunnel::new(Section::slot(1.0).unwrap(), ratio).unwrap();
        let b = Tunnel::with_terms(Section::slot(1.0).unwrap(), ratio, 40).unwrap();
        println!("slot {ratio} {} {:e}", a.transmitted(), a.transmitted() - b.transmitted());
    }
    for ratio in [0.05, 0.1, 0.25, 0.46, 0.5, 1.0, 2.0, 5.0] {
        let a = Tunnel::new(Section::rectangle(1.0, 1.0).unwrap(), ratio).unwrap();
        let b = Tunnel::with_terms(Section::rectangle(1.0, 1.0).unwrap(), ratio, 40).unwrap();
        println!("square {ratio} {} {:e}", a.transmitted(), a.transmitted() - b.transmitted());
        let t0 = std::time::Instant::now();
        let p = Tunnel::new(Section::polygon(vec![glam::DVec2::ZERO, glam::DVec2::X, glam::DVec2::ONE, glam::DVec2::Y]).unwrap(), ratio).unwrap();
        println!("   as polygon {:e} {:?}", p.transmitted() - a.transmitted(), t0.elapsed());
    }
}
