// Rank of a sparse matrix modulo 65521 by LinBox's sparse elimination; prints the rank and the processor seconds it took.
#include <linbox/linbox-config.h>
#include <givaro/modular.h>
#include <linbox/algorithms/gauss.h>
#include <linbox/matrix/sparse-matrix.h>
#include <ctime>
#include <fstream>
#include <iostream>

int main(int argc, char** argv) {
  if (argc < 2) return 2;
  using Field = Givaro::Modular<double>;
  Field field(65521);
  std::ifstream file(argv[1]);
  LinBox::MatrixStream<Field> stream(field, file);
  LinBox::SparseMatrix<Field, LinBox::SparseMatrixFormat::SparseSeq> matrix(stream);
  const std::clock_t start = std::clock();
  LinBox::GaussDomain<Field> domain(field);
  std::size_t rank = 0;
  domain.rankInPlace(rank, matrix, LinBox::PivotStrategy::Linear);
  std::cout << rank << " " << double(std::clock() - start) / CLOCKS_PER_SEC << std::endl;
}
