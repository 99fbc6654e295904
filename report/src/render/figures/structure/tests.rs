//! What every picture of a structure must keep.

use std::collections::BTreeSet;

use super::*;
use crate::render::figures::layout::Layout;
use crate::render::figures::overlap::Legibility;
use crate::structure::Structure;

/// Rings of every kind: monocycles, fused, spiro, bridged, cages, with what hangs on them; chains, charges, multiple bonds.
const STRUCTURES: [&str; 64] = [
    "C",
    "CC",
    "C#N",
    "CC#CC",
    "C=C=C",
    "CC(C)(C)C",
    "C1CC1",
    "C1CCC1",
    "C1CCCC1",
    "C1CCCCC1",
    "C1CCCCCCC1",
    "C1CCCCCCCCCCC1",
    "C1CO1",
    "C1CN1",
    "C1CS1",
    "C1COC1",
    "C1CNC1",
    "C1=CC1",
    "C1=CCC1",
    "C1=CC=CC=CC=C1",
    "O=C1CCO1",
    "O=C1CCN1",
    "C1CC2CC12",
    "C1C2CC12",
    "C12C3C4C1C5C2C3C45",
    "C1C2CC1C2",
    "C1C23CC2(C1)C3",
    "C1C23CC12C3",
    "C1CC2CC1C2",
    "C1CC2CCC1C2",
    "C1CC2CCC1CC2",
    "C1=CC2CC1C=C2",
    "C12C3C1C4C2C34",
    "C12C3C1C23",
    "C1C2C3C4C1C2C34",
    "C12C3C4C1C5C2C3C45C(=O)O",
    "C1C2CC3CC1CC(C2)C3",
    "NC12CC3CC(C1)CC(C3)C2",
    "C12C3C4C5C1C6C7C2C8C3C9C4C%10C5C6C%11C7C8C9C%10%11",
    "C1CC12CC2",
    "C1CCC12CCC2",
    "C1CC12CCCCC2",
    "c1ccccc1",
    "c1ccc2ccccc2c1",
    "c1ccc(cc1)C1CC1",
    "C1CC1c1ccc(cc1)C1CO1",
    "OC(=O)C12CC(C1)C2",
    "N#CC12CC(C1)C2",
    "O=[N+]([O-])C12C3([N+](=O)[O-])C4C1C5C2C3C45",
    "C[N+](C)(C)C",
    "C1CC2C1CC2",
    "C1CC2CCCC2C1",
    "C1CCC2CCCCC2C1",
    "C1CC2OC2C1",
    "CC1(C)C2CCC1(C)C(=O)C2",
    "CC1(C)C2CC=C(C)C1C2",
    "C1N2CN3CN1CN(C2)C3",
    "C1CN2CCC1CC2",
    "CC(=O)OCC1CO1",
    "ClCC1CO1",
    "OCC1(CO)COC1",
    "CC1=C(C)C1=O",
    "[N-]=[N+]=NCC1CC1",
    "O=S1(=O)CCC1",
];

fn drawing(smiles: &str) -> StructureDrawing {
    let structure =
        Structure::from_smiles(smiles).unwrap_or_else(|error| panic!("{smiles}: {error}"));
    let mut strained = Vec::new();
    for ring in structure.molecule.rings().iter() {
        strained.push(StrainedSystem {
            atoms: ring.iter().copied().map(usize::from).collect(),
            label: "115 kJ/mol".to_owned(),
        });
    }
    strained.truncate(1);
    StructureDrawing {
        structure,
        strained,
    }
}

#[test]
fn no_two_atoms_overlap() {
    for smiles in STRUCTURES {
        let molecule = drawing(smiles).structure.molecule;
        let points = Layout::of(&molecule).points;
        let found = Legibility::of(&points, &crate::render::figures::layout::bonds(&molecule));
        assert!(found.atoms > 0.35, "{smiles}: {found:?}");
    }
}

/// The same for every structure of the measured data that can be read.
#[test]
fn no_two_atoms_overlap_in_measured_molecules() {
    let table = concat!(env!("CARGO_MANIFEST_DIR"), "/../data/measurements.csv");
    let mut rows = csv::Reader::from_path(table).unwrap();
    let column = rows
        .headers()
        .unwrap()
        .iter()
        .position(|head| head == "smiles")
        .unwrap();
    let smiles: BTreeSet<String> = rows
        .records()
        .map(|row| row.unwrap()[column].to_owned())
        .collect();
    let structures = smiles
        .iter()
        .filter_map(|smiles| Structure::from_smiles(smiles).ok());
    let mut count = 0;
    for Structure {
        molecule, input, ..
    } in structures
    {
        let points = Layout::of(&molecule).points;
        let found = Legibility::of(&points, &crate::render::figures::layout::bonds(&molecule));
        assert!(found.atoms > 0.35, "{input}: {found:?}");
        count += 1;
    }
    assert!(count > 1000, "only {count} structures were read");
}

/// Reads the pictures back from their SVG: with letters as wide as those of a wide sans-serif font, no word leaves the frame.
#[test]
fn no_word_leaves_the_frame() {
    for smiles in STRUCTURES {
        let svg = draw(&drawing(smiles)).inline("figure", "Title");
        let [left, top, width, height] = numbers_of(attribute(&svg, "viewBox"));
        for word in svg.split("<text ").skip(1) {
            let number = |name| attribute(word, name).parse::<f64>().unwrap();
            let (x, y, size) = (number("x"), number("y"), number("font-size"));
            let text = word.split_once('>').unwrap().1.split_once('<').unwrap().0;
            // DejaVu Sans, the widest font of the list: capitals to 0.86, others mostly under 0.65 of the size.
            let wide = size
                * text
                    .chars()
                    .map(|c| if c.is_uppercase() { 0.86 } else { 0.65 })
                    .sum::<f64>();
            let from = match attribute(word, "text-anchor") {
                "start" => x,
                "middle" => x - wide / 2.0,
                _ => x - wide,
            };
            assert!(
                from > left && from + wide < left + width,
                "{smiles}: {text} sideways"
            );
            assert!(
                y - 0.8 * size > top && y + 0.25 * size < top + height,
                "{smiles}: {text} up or down"
            );
        }
    }
}

#[test]
fn the_same_structure_gives_the_same_picture() {
    for smiles in ["C12C3C4C1C5C2C3C45", "OC(=O)C12CC(C1)C2", "C1CC1c1ccccc1"] {
        let [first, second] = [(); 2].map(|()| draw(&drawing(smiles)).inline("figure", "Title"));
        assert_eq!(first, second);
    }
}

#[test]
fn words_in_a_picture_are_escaped() {
    let svg = draw(&drawing("C1CC1")).inline("figure", "<script>&\"'");
    assert!(svg.contains("<title id=\"figure-title\">&lt;script&gt;&amp;&quot;&#39;</title>"));
    assert!(!svg.contains("dominant-baseline"));
}

fn attribute<'a>(element: &'a str, name: &str) -> &'a str {
    let start = format!("{name}=\"");
    let (_, rest) = element
        .split_once(&format!(" {start}"))
        .or_else(|| element.split_once(&start))
        .unwrap_or_else(|| panic!("no {name} in {element}"));
    rest.split_once('"').unwrap().0
}

fn numbers_of(list: &str) -> [f64; 4] {
    let numbers: Vec<f64> = list.split(' ').map(|n| n.parse().unwrap()).collect();
    numbers.try_into().unwrap()
}
