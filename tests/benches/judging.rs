//! What it costs to judge one exposure: well below a microsecond, since the
//! spread of a finding takes thousands of judgements.

use divan::{Bencher, black_box};
use farglow::guidance::Library;

fn main() {
    divan::main();
}

#[divan::bench(args = ["eu-2006-25-m", "eu-2006-25-o", "icnirp-2013-ir-eye", "pain-time"])]
fn by_id(bencher: Bencher<'_, '_>, id: &str) {
    let library = Library::shipped();
    bencher.bench(|| library.judge(black_box(id), black_box(2500.0), black_box(Some(7.5))));
}

#[divan::bench]
fn by_course(bencher: Bencher<'_, '_>) {
    let course = Library::shipped()
        .course("eu-2006-25-m")
        .expect("it is shipped");
    bencher.bench(|| course.judge(black_box(2500.0), black_box(Some(7.5))));
}

#[divan::bench]
fn allowed_time_alone(bencher: Bencher<'_, '_>) {
    let course = Library::shipped()
        .course("eu-2006-25-m")
        .expect("it is shipped");
    bencher.bench(|| course.allowed(black_box(2500.0)));
}
