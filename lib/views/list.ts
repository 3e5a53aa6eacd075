export interface ListView<T> {
  items: T[];
  total: number;
  page: number;
  pageSize: number;
}
