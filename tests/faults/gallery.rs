//! Every file of the gallery holds a believable mistake; the snapshot beside it is what its
//! builder reads. Review a changed snapshot like prose: would one know what to type?
//!
//! A comment line `# --set ADDRESS=VALUE` stands for that argument.

use std::fmt::Write;
use std::fs;
use std::path::PathBuf;

use modewright::file;
use modewright::report::render;

#[test]
fn every_mistake_gets_an_answer() {
    let folder = PathBuf::from(env!("CARGO_MANIFEST_DIR")).join("tests/faults/gallery");
    let mut files: Vec<PathBuf> = fs::read_dir(folder)
        .unwrap()
        .map(|entry| entry.unwrap().path())
        .collect();
    files.sort();
    assert!(files.len() >= 45, "the gallery has {} files", files.len());
    let mut settings = insta::Settings::clone_current();
    settings.set_snapshot_path("snapshots");
    settings.set_prepend_module_to_snapshot(false);
    settings.set_omit_expression(true);
    settings.bind(|| {
        let mut quiet = String::new();
        for path in files {
            let name = path.file_stem().unwrap().to_string_lossy().into_owned();
            let text = fs::read_to_string(&path).unwrap();
            let overrides: Vec<String> = text
                .lines()
                .filter_map(|line| line.strip_prefix("# --set "))
                .map(str::to_string)
                .collect();
            match file::load(&format!("{name}.toml"), &text, &overrides) {
                Ok(_) => writeln!(quiet, "{name} is taken without a word").unwrap(),
                Err(refused) => {
                    let told = render::diagnostics::render(&refused.diagnostics, &refused.sources);
                    insta::assert_snapshot!(name, anstream::adapter::strip_str(&told).to_string());
                }
            }
        }
        assert!(quiet.is_empty(), "{quiet}");
    });
}
