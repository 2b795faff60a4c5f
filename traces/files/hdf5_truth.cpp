#include "traces/files/hdf5_truth.hpp"

#include <fmt/format.h>

#include "traces/base/errors.hpp"
#include "traces/files/file_facts.hpp"
#include "traces/files/hdf5_attributes.hpp"
#include "traces/files/hdf5_file.hpp"
#include "traces/files/rehearsal.hpp"

namespace cistern {
namespace {

constexpr std::size_t longest_name = 256;

std::string column_name(const Hdf5Handle& group, hsize_t index, const std::string& file) {
  char name[longest_name] = {};
  const ssize_t length =
      H5Lget_name_by_idx(group.get(), ".", H5_INDEX_NAME, H5_ITER_INC, index, name, sizeof name, H5P_DEFAULT);
  if (length > 0 && static_cast<std::size_t>(length) < longest_name) return name;
  throw InputError(file + ": /truth", fmt::format("column {} has no readable name, expected a short one", index));
}

/// A column whose values are still to be read.
struct OpenColumn {
  TruthColumn truth;
  std::string place;
  Hdf5Handle data;
};

OpenColumn open_column(const Hdf5Handle& group, const std::string& column, const std::string& file,
                       std::int64_t traces) {
  const std::string place = fmt::format("{}: /truth/{}", file, column);
  Hdf5Handle data(H5Dopen2(group.get(), column.c_str(), H5P_DEFAULT), H5Dclose);
  const Hdf5Handle type(data.is_open() ? H5Dget_type(data.get()) : H5I_INVALID_HID, H5Tclose);
  const Hdf5Handle space(data.is_open() ? H5Dget_space(data.get()) : H5I_INVALID_HID, H5Sclose);
  const H5T_class_t kind = type.is_open() ? H5Tget_class(type.get()) : H5T_NO_CLASS;
  const bool is_one_number_per_trace = (kind == H5T_FLOAT || kind == H5T_INTEGER) && space.is_open() &&
                                       H5Sget_simple_extent_ndims(space.get()) == 1 &&
                                       H5Sget_simple_extent_npoints(space.get()) == traces;
  if (!is_one_number_per_trace) {
    throw InputError(place, fmt::format("is not one number for each of {} traces, as expected", traces));
  }
  const auto unit = read_text_attribute(data.get(), place, "unit");
  if (!unit) throw InputError(place, "has no attribute unit, expected a text");
  return {{column, *unit, {}}, place, std::move(data)};
}

TruthColumn read_values(OpenColumn column, std::int64_t traces) {
  column.truth.values.resize(static_cast<std::size_t>(traces));
  if (H5Dread(column.data.get(), H5T_NATIVE_DOUBLE, H5S_ALL, H5S_ALL, H5P_DEFAULT, column.truth.values.data()) < 0) {
    throw InputError(column.place, "cannot be read, expected an undamaged file");
  }
  return std::move(column.truth);
}

Hdf5Handle create_column(const Hdf5Handle& group, const TruthColumn& column) {
  const hsize_t length = column.values.size();
  const Hdf5Handle space(H5Screate_simple(1, &length, nullptr), H5Sclose);
  const Hdf5Handle properties(H5Pcreate(H5P_DATASET_CREATE), H5Pclose);
  H5Pset_obj_track_times(properties.get(), false);  // the same traces make the same bytes
  return {H5Dcreate2(group.get(), column.name.c_str(), H5T_IEEE_F64LE, space.get(), H5P_DEFAULT, properties.get(),
                     H5P_DEFAULT),
          H5Dclose};
}

struct Truth {
  Hdf5Handle file;
  std::int64_t traces{0};
  std::vector<OpenColumn> columns;
};

Truth open_truth(const std::filesystem::path& path) {
  const std::string name = path.string();
  Truth truth{open_hdf5_file(path), 0, {}};
  if (H5Lexists(truth.file.get(), "truth", H5P_DEFAULT) <= 0) return truth;
  truth.traces = examine_hdf5_codes(open_hdf5_codes(truth.file, name), name).traces;
  const Hdf5Handle group(H5Gopen2(truth.file.get(), "truth", H5P_DEFAULT), H5Gclose);
  H5G_info_t facts{};
  if (!group.is_open() || H5Gget_info(group.get(), &facts) < 0) {
    throw InputError(name + ": /truth", "cannot be read, expected a group of columns");
  }
  for (hsize_t i = 0; i < facts.nlinks; ++i) {
    truth.columns.push_back(open_column(group, column_name(group, i, name), name, truth.traces));
  }
  return truth;
}

}  // namespace

std::vector<TruthColumn> read_truth(const std::filesystem::path& path) {
  require_file(path);
  if (format_of(path) != TraceFormat::Hdf5) throw InputError(path.string(), "cannot hold truth, expected an .h5 file");
  if (!comes_to_an_end([&] { (void)open_truth(path); })) refuse_damaged_hdf5(path);
  Truth truth = open_truth(path);
  std::vector<TruthColumn> columns;
  for (OpenColumn& column : truth.columns) columns.push_back(read_values(std::move(column), truth.traces));
  return columns;
}

void write_hdf5_truth(hid_t file, const std::string& name, const std::vector<TruthColumn>& truth) {
  if (truth.empty()) return;
  const Hdf5Handle group(H5Gcreate2(file, "truth", H5P_DEFAULT, H5P_DEFAULT, H5P_DEFAULT), H5Gclose);
  for (const TruthColumn& column : truth) {
    CISTERN_ASSERT(!column.name.empty() && column.name.size() < longest_name &&
                   column.name.find('/') == std::string::npos);
    const Hdf5Handle data = create_column(group, column);
    if (!data.is_open() ||
        H5Dwrite(data.get(), H5T_NATIVE_DOUBLE, H5S_ALL, H5S_ALL, H5P_DEFAULT, column.values.data()) < 0) {
      throw SystemFault(fmt::format("{}: /truth/{} cannot be written (is the disk full?)", name, column.name));
    }
    write_text_attribute(data.get(), name, "unit", column.unit);
  }
}

}  // namespace cistern
