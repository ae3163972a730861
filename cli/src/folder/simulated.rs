//! Drawn tables as files, and `truth.csv`: the value of every unknown that they were drawn from.

use std::path::Path;

use stook_sampler::simulate::Simulated;

use super::{number, write_file, write_rows};
use crate::report::Failure;

pub(super) fn write(folder: &Path, simulated: &Simulated, files: &[String]) -> Result<(), Failure> {
    for (table, file) in simulated.tables.iter().zip(files) {
        let delimiter = if file.to_ascii_lowercase().ends_with(".tsv") { b'\t' } else { b',' };
        write_file(&folder.join(file), |out| {
            let mut writer = csv::WriterBuilder::new().delimiter(delimiter).from_writer(out);
            writer.write_record(&table.headings)?;
            for row in &table.rows {
                writer.write_record(row)?;
            }
            writer.flush()
        })?;
    }
    let rows = simulated
        .truth
        .iter()
        .map(|(scalar, value)| vec![scalar.quantity.clone(), scalar.labels.join("/"), number(*value)]);
    write_rows(&folder.join("truth.csv"), &["quantity", "labels", "value"], rows)
}
