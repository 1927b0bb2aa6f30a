//! What a worksheet of four pages costs: aimed at no more than 150 ms and 150 kB.

use farglow::worksheet::attach;
use farglow::worksheet::layout::{self, Paper};
use farglow::worksheet::paint;

#[allow(dead_code)]
#[path = "../contract/sheet.rs"]
mod sheet;

fn main() {
    let bytes = sheet::issued(Paper::A4, true).expect("the sheet is written");
    println!("worksheet: {} bytes", bytes.len());
    divan::main();
}

#[divan::bench]
fn whole_way() -> Vec<u8> {
    sheet::issued(Paper::A4, true).expect("the sheet is written")
}

#[divan::bench]
fn blocks_to_pages(bencher: divan::Bencher<'_, '_>) {
    let blocks = sheet::blocks();
    bencher.bench(|| layout::pages(&blocks, Paper::A4, &sheet::furniture(true)));
}

#[divan::bench]
fn pages_to_pdf(bencher: divan::Bencher<'_, '_>) {
    let pages = layout::pages(&sheet::blocks(), Paper::A4, &sheet::furniture(true));
    bencher.bench(|| paint::pdf(&pages, &sheet::meta()).expect("it is written"));
}

#[divan::bench]
fn attach_and_extract(bencher: divan::Bencher<'_, '_>) {
    let pages = layout::pages(&sheet::blocks(), Paper::A4, &sheet::furniture(true));
    let pdf = paint::pdf(&pages, &sheet::meta()).expect("it is written");
    bencher.bench(|| {
        let with = attach::attach(
            &pdf,
            "a.farglow",
            "application/json",
            sheet::NOTEBOOK.as_bytes(),
            "",
        );
        attach::extract(&with.expect("it is attached")).expect("it is found")
    });
}

#[divan::bench]
fn curve() -> farglow::drawing::picture::Picture {
    sheet::plot()
}
