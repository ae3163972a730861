//! `draws.parquet`: columns `chain`, `draw` and one for each scalar, a row group for each chain.

use std::io::Write;
use std::path::Path;
use std::sync::Arc;

use parquet::basic::{Compression, Encoding, Repetition, Type as PhysicalType};
use parquet::data_type::{DoubleType, Int32Type};
use parquet::errors::ParquetError;
use parquet::file::properties::{EnabledStatistics, WriterProperties};
use parquet::file::writer::{SerializedFileWriter, SerializedRowGroupWriter};
use parquet::schema::types::{Type, TypePtr};
use stook_sampler::draws::Draws;

use super::write_file;
use crate::report::Failure;

pub(super) fn write(path: &Path, draws: &Draws) -> Result<(), Failure> {
    write_file(path, |file| encode(file, draws).map_err(std::io::Error::other))
}

fn encode(file: &mut (impl Write + Send), draws: &Draws) -> Result<(), ParquetError> {
    let properties = WriterProperties::builder()
        .set_compression(Compression::UNCOMPRESSED)
        .set_encoding(Encoding::PLAIN)
        .set_dictionary_enabled(false)
        .set_statistics_enabled(EnabledStatistics::None)
        .build();
    let mut writer = SerializedFileWriter::new(file, schema(draws)?, Arc::new(properties))?;
    let numbers: Vec<i32> = (1..).take(draws.draws).collect();
    for chain in 0..draws.chains {
        let mut group = writer.next_row_group()?;
        whole_numbers(&mut group, &vec![i32::try_from(chain + 1).unwrap_or(i32::MAX); draws.draws])?;
        whole_numbers(&mut group, &numbers)?;
        for values in &draws.values {
            let own = values.get(chain * draws.draws..(chain + 1) * draws.draws).unwrap_or_default();
            if let Some(mut column) = group.next_column()? {
                column.typed::<DoubleType>().write_batch(own, None, None)?;
                column.close()?;
            }
        }
        group.close()?;
    }
    writer.close().map(drop)
}

fn whole_numbers<W: Write + Send>(
    group: &mut SerializedRowGroupWriter<'_, W>,
    values: &[i32],
) -> Result<(), ParquetError> {
    if let Some(mut column) = group.next_column()? {
        column.typed::<Int32Type>().write_batch(values, None, None)?;
        column.close()?;
    }
    Ok(())
}

fn schema(draws: &Draws) -> Result<TypePtr, ParquetError> {
    let field = |name: &str, physical: PhysicalType| {
        Type::primitive_type_builder(name, physical)
            .with_repetition(Repetition::REQUIRED)
            .build()
            .map(Arc::new)
    };
    let mut fields = vec![field("chain", PhysicalType::INT32)?, field("draw", PhysicalType::INT32)?];
    for scalar in &draws.scalars {
        fields.push(field(&scalar.title(), PhysicalType::DOUBLE)?);
    }
    Type::group_type_builder("draws").with_fields(fields).build().map(Arc::new)
}

#[cfg(test)]
mod tests {
    #![allow(clippy::unwrap_used)]
    use super::*;
    use parquet::file::reader::{FileReader, SerializedFileReader};
    use parquet::record::RowAccessor;
    use stook_sampler::draws::{Scalar, ScalarKind};

    #[test]
    fn draws_read_back_with_their_chains_and_names() {
        let scalar = |quantity: &str, labels: &[&str]| Scalar {
            quantity: quantity.into(),
            labels: labels.iter().map(|label| label.to_string()).collect(),
            unit: None,
            kind: ScalarKind::Unknown,
        };
        let draws = Draws {
            scalars: vec![scalar("grand", &[]), scalar("season_dev", &["2019"])],
            chains: 2,
            draws: 3,
            values: vec![vec![0.1, 0.2, 0.3, 0.4, 0.5, 0.6], vec![-1.0, -2.0, -3.0, -4.0, -5.0, -6.0]],
        };
        let place = tempfile::tempdir().unwrap();
        let path = place.path().join("draws.parquet");
        write(&path, &draws).unwrap();
        let reader = SerializedFileReader::new(std::fs::File::open(&path).unwrap()).unwrap();
        assert_eq!(reader.num_row_groups(), 2);
        let names: Vec<String> = reader
            .metadata()
            .file_metadata()
            .schema_descr()
            .columns()
            .iter()
            .map(|column| column.name().to_string())
            .collect();
        assert_eq!(names, ["chain", "draw", "grand", "season_dev[2019]"]);
        let rows: Vec<_> = reader.get_row_iter(None).unwrap().map(|row| row.unwrap()).collect();
        assert_eq!(rows.len(), 6);
        let fourth = &rows[3];
        assert_eq!((fourth.get_int(0).unwrap(), fourth.get_int(1).unwrap()), (2, 1));
        assert_eq!((fourth.get_double(2).unwrap(), fourth.get_double(3).unwrap()), (0.4, -4.0));
    }
}
