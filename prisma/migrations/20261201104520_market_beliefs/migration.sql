-- AlterTable
ALTER TABLE "market" ADD COLUMN     "addressableError" DOUBLE PRECISION NOT NULL DEFAULT 0.5,
ADD COLUMN     "focalAddressable" DOUBLE PRECISION,
ADD COLUMN     "priors" JSONB,
ADD COLUMN     "rivalAddressable" DOUBLE PRECISION;
