-- AlterTable
ALTER TABLE "observation" ADD COLUMN     "exclusion" TEXT;

-- AlterTable
ALTER TABLE "series_revision" ADD COLUMN     "createdByName" TEXT,
ADD COLUMN     "fileHash" TEXT,
ADD COLUMN     "note" TEXT,
ADD COLUMN     "readingNotes" JSONB,
ADD COLUMN     "restoredFrom" INTEGER;
